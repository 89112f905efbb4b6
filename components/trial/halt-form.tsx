'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea } from '@/components/forms/text-field';
import { type FormAction, useActionForm } from '@/components/forms/use-action-form';
import type { trialFormSchemas } from '@/lib/schemas/trial-forms';

/** The act of halting, as the form sends it. */
export type HaltAction = FormAction<(typeof trialFormSchemas)['halt-trial'], unknown>;

/** The reason for a halt, and the act itself. */
export function HaltForm({ trialCode, action }: { trialCode: string; action: HaltAction }) {
  const router = useRouter();
  const state = useActionForm({
    schema: () =>
      import('@/lib/schemas/trial-forms').then(({ trialFormSchemas: forms }) => forms['halt-trial']),
    action,
    defaultValues: { trialCode, reason: '' },
    onSaved: () => router.refresh(),
  });
  return (
    <ActionForm state={state} label="Halt the trial" saved="Halted.">
      <TextArea name="reason" label="Reason" rows={3} />
      <SubmitButton variant="danger" pendingLabel="Halting…">
        Halt {trialCode} now
      </SubmitButton>
    </ActionForm>
  );
}
