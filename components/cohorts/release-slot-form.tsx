'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { trialSchema } from '@/components/forms/fetched-schemas';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { SubjectData, TrialAction } from './cohort-data';
import { useSay } from './saved-notice';

const schema = trialSchema('release-slot');

/** Gives a reserved place back, with the reason. */
export function ReleaseSlotForm({
  trialCode,
  subject,
  spot,
  action,
}: {
  trialCode: string;
  subject: SubjectData;
  spot: string;
  action: TrialAction<'release-slot'>;
}) {
  const router = useRouter();
  const say = useSay();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, subjectId: subject.id, reason: '' },
    onSaved: () => {
      say(spot, `Recorded. The place of ${subject.code} was given back and is free.`);
      router.refresh();
    },
  });
  if (state.outcome.kind === 'saved') return null;
  return (
    <ActionForm state={state} label={`Give back the place of ${subject.code}`}>
      <TextArea
        name="reason"
        label="Reason"
        help="Such as: screen failure, consent withdrawn. No name, no birth date."
        rows={2}
      />
      <div>
        <SubmitButton variant="secondary" pendingLabel="Giving back…">
          Give the place back
        </SubmitButton>
      </div>
    </ActionForm>
  );
}
