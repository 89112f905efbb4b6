'use client';

import { ActionForm } from '@/components/forms/action-form';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult } from '@/lib/schemas/action-result';

/** Asks for a link by mail. What it answers is the same for every address. */
export function ForgottenPasswordForm({
  action,
}: {
  action: (input: { email: string; submissionKey: string }) => Promise<ActionResult>;
}) {
  const state = useActionForm({
    schema: () =>
      import('@/lib/schemas/installation-inputs').then(
        ({ installationInputSchemas }) => installationInputSchemas['request-password-reset'],
      ),
    action,
    defaultValues: { email: '' },
  });
  return (
    <div className="max-w-md">
      <ActionForm
        state={state}
        label="Ask for a new password"
        saved="If this address belongs to an account, a link is on its way. It may take a few minutes."
      >
        <TextField
          name="email"
          type="email"
          label="E-mail address"
          autoComplete="username"
          autoCapitalize="none"
          spellCheck={false}
        />
        <div>
          <SubmitButton variant="primary" pendingLabel="Sending…">
            Send the link
          </SubmitButton>
        </div>
      </ActionForm>
    </div>
  );
}
