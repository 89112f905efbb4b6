'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextArea } from '@/components/forms/text-field';
import { type ActionFormOptions, useActionForm } from '@/components/forms/use-action-form';
import { DisclosureHalt } from '@/components/ui/disclosure-halt';
import { trialFormSchemas } from '@/lib/schemas/trial-forms';

const schema = trialFormSchemas['halt-trial'];

/** Halting the trial in two clicks and a reason, from its header. */
export function HaltTrial({
  trialCode,
  action,
}: {
  trialCode: string;
  action: ActionFormOptions<typeof schema, unknown>['action'];
}) {
  const router = useRouter();
  const state = useActionForm({
    schema,
    action,
    defaultValues: { trialCode, reason: '' },
    onSaved: () => router.refresh(),
  });
  return (
    <DisclosureHalt consequence="Nobody further is reserved or dosed, no dose is released, and everyone is told at once. Only the quorum of safety reviewers lifts a halt.">
      <ActionForm state={state} label="Halt the trial" saved="Halted.">
        <TextArea name="reason" label="Reason" rows={3} />
        <SubmitButton variant="danger" pendingLabel="Halting…">
          Halt {trialCode} now
        </SubmitButton>
      </ActionForm>
    </DisclosureHalt>
  );
}
