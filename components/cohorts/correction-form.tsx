'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import { formatTime } from '../ui/format-time';
import { OutcomeMark } from '../ui/outcome-mark';
import type { CohortWork, SubjectData, TrialAction } from './cohort-data';
import { OutcomeFields } from './outcome-fields';
import { useSay } from './saved-notice';

const schema = trialSchema('correct-outcome');

/** The outcome as it stands on record. */
function Recorded({ work, subject }: { work: CohortWork; subject: SubjectData }) {
  const { outcome, onsetAt, site } = subject;
  const word = outcome === 'present' || outcome === 'absent' ? work.labels[outcome] : 'not evaluable';
  return (
    <div>
      <p className="font-semibold">On record</p>
      <p className="py-1">
        <OutcomeMark outcome={outcome ?? 'pending'} word={outcome === null ? 'awaited' : word} />
      </p>
      {onsetAt ? <p className="text-sm text-ink-soft">began {formatTime(onsetAt, site.timeZone)}</p> : null}
    </div>
  );
}

/** Corrects a recorded outcome: what is on record beside what it shall be, and the reason. Both are kept. */
export function CorrectionForm({
  work,
  subject,
  spot,
  action,
  onCorrected,
}: {
  work: CohortWork;
  subject: SubjectData;
  spot: string;
  action: TrialAction<'correct-outcome'>;
  onCorrected: () => void;
}) {
  const router = useRouter();
  const say = useSay();
  const { outcome, onsetAt, revision } = subject;
  const state = useActionForm({
    schema,
    // What was seen is what is drawn beside the form: after "Show the new state" that is the newer record.
    action: (input) => action({ ...input, seenRevision: revision }),
    defaultValues: {
      trialCode: work.trialCode,
      subjectId: subject.id,
      seenRevision: revision,
      outcome: outcome === 'absent' ? 'absent' : 'present',
      onsetAt,
      reason: '',
    },
    onSaved: ({ events }) => {
      const again = events.includes('recommendation-computed')
        ? ' The recommendation was computed anew and signatures start at zero.'
        : '';
      say(spot, `Corrected. The record of ${subject.code} holds the old and the new outcome.${again}`);
      onCorrected();
      router.refresh();
    },
  });
  return (
    <ActionForm state={state} label={`Correct the outcome of ${subject.code}`}>
      <div className="grid gap-x-6 gap-y-3 @lg:grid-cols-[minmax(0,12rem)_minmax(0,1fr)]">
        <Recorded work={work} subject={subject} />
        <div className="grid gap-4.5">
          <OutcomeFields work={work} subject={subject} label="Correct to" />
        </div>
      </div>
      <TextArea
        name="reason"
        label="Reason of the correction"
        help="What was wrong and how it was found. No name, no birth date."
        rows={2}
      />
      <div>
        <SubmitButton variant="secondary" pendingLabel="Correcting…">
          Correct outcome
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
