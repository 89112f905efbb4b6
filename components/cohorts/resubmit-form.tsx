'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import type { TrialAction } from './cohort-data';
import { useSay } from './saved-notice';

const schema = trialSchema('resubmit-cohort');

/** Resubmits a returned cohort once its questions are answered: the recommendation is computed anew. */
export function ResubmitForm({
  trialCode,
  cohortId,
  cohortNumber,
  action,
  why,
}: {
  trialCode: string;
  cohortId: string;
  cohortNumber: number;
  action: TrialAction<'resubmit-cohort'>;
  why: string | null;
}) {
  const router = useRouter();
  const say = useSay();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, cohortId },
    onSaved: () => {
      say(
        'cohort',
        `Resubmitted. The recommendation that follows cohort ${cohortNumber} waits for the safety reviewers.`,
      );
      router.refresh();
    },
  });
  if (state.outcome.kind === 'saved') return null;
  return (
    <ActionForm state={state} label={`Resubmit cohort ${cohortNumber}`}>
      <p className="max-w-prose">
        Resubmit when every question is answered. The recommendation is computed anew from the records as they
        then stand, and signatures start at zero.
      </p>
      <div>
        <SubmitButton pendingLabel="Resubmitting…" disabledReason={why ?? undefined}>
          Resubmit cohort {cohortNumber}
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
