'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import { afterRecord, type CohortWork, type SubjectData, type TrialAction } from './cohort-data';
import { OutcomeFields } from './outcome-fields';
import { useSay } from './saved-notice';

const schema = trialSchema('record-outcome');

/** Records the outcome of a dosed subject. */
export function OutcomeForm({
  work,
  subject,
  spot,
  action,
  isPrimary,
}: {
  work: CohortWork;
  subject: SubjectData;
  spot: string;
  action: TrialAction<'record-outcome'>;
  isPrimary: boolean;
}) {
  const router = useRouter();
  const say = useSay();
  const state = useActionForm({
    schema,
    action,
    defaultValues: {
      trialCode: work.trialCode,
      subjectId: subject.id,
      outcome: '' as 'present',
      onsetAt: null,
    },
    onSaved: ({ events }) => {
      const word = work.labels[state.form.getValues('outcome')];
      say(spot, afterRecord(`Recorded. ${subject.code}: ${word}.`, events, work.cohortNumber));
      router.refresh();
    },
  });
  if (state.outcome.kind === 'saved') return null;
  return (
    <ActionForm state={state} label={`Record the outcome of ${subject.code}`}>
      <OutcomeFields work={work} subject={subject} label="Outcome" />
      <div>
        <SubmitButton variant={isPrimary ? 'primary' : 'secondary'} pendingLabel="Recording…">
          Record outcome
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
