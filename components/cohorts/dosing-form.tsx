'use client';

import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import { useWatch } from 'react-hook-form';
import { ActionForm } from '@/components/forms/action-form';
import { DateTimeField } from '@/components/forms/date-time-field';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { DecimalField } from '@/components/forms/number-field';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { CohortWork, SubjectData, TrialAction } from './cohort-data';
import { useSay } from './saved-notice';

const schema = trialSchema('record-dosing');

/** A decimal without the zeros that say nothing: "012.50" is "12.5". Exact, and without the library of decimals. */
const withoutIdleZeros = (text: string): string =>
  text
    .replace(/^0+(?=\d)/, '')
    .replace(/(\.\d*?)0+$/, '$1')
    .replace(/\.$/, '');

/** Whether a dose as typed is a number, and another than the released one; the schema says what else is wrong. */
function differs(typed: string, released: string): boolean {
  const text = typed.trim();
  return /^\d{1,20}(\.\d{1,20})?$/.test(text) && withoutIdleZeros(text) !== withoutIdleZeros(released);
}

/** Records that a subject was dosed: when, and the dose really given, with the reason where it is another one. */
export function DosingForm({
  work,
  subject,
  spot,
  action,
  isPrimary,
}: {
  work: CohortWork;
  subject: SubjectData;
  spot: string;
  action: TrialAction<'record-dosing'>;
  isPrimary: boolean;
}) {
  const router = useRouter();
  const say = useSay();
  const { dose } = work;
  const state = useActionForm({
    schema,
    action,
    defaultValues: {
      trialCode: work.trialCode,
      subjectId: subject.id,
      dosedAt: '',
      doseGiven: dose.value,
      deviationReason: null,
    },
    onSaved: () => {
      say(spot, `Recorded. The dosing of ${subject.code} is on record and its observation window runs.`);
      router.refresh();
    },
  });
  const typed = useWatch({ control: state.form.control, name: 'doseGiven' });
  const isOther = differs(typed, dose.value);
  const { setValue } = state.form;
  useEffect(() => {
    if (!isOther) setValue('deviationReason', null);
  }, [isOther, setValue]);
  if (state.outcome.kind === 'saved') return null;
  return (
    <ActionForm state={state} label={`Record the dosing of ${subject.code}`}>
      <DateTimeField
        name="dosedAt"
        label="Date and time of dosing"
        zone={subject.site.timeZone}
        place={subject.site.name}
        readAt={work.readAt}
        notBefore={dose.releasedAt}
      />
      <DecimalField
        name="doseGiven"
        label="Dose given"
        unit={dose.unit}
        help={`The released dose is ${dose.text}. Change it only if another dose was really given.`}
      />
      {isOther ? (
        <TextArea
          name="deviationReason"
          label="Why another dose was given"
          help="It is a deviation from the released dose and is shown to the safety reviewers. No name, no birth date."
          emptyAs={null}
        />
      ) : null}
      <div>
        <SubmitButton variant={isPrimary ? 'primary' : 'secondary'} pendingLabel="Recording…">
          Record dosing
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
