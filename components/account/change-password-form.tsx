'use client';

import { ActionForm } from '@/components/forms/action-form';
import { PasswordField } from '@/components/forms/password-field';
import { SubmitButton } from '@/components/forms/submit-button';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult } from '@/lib/schemas/action-result';
import { SHORTEST_PASSWORD } from '@/lib/schemas/password-length';

/** Changes one's own password; the present one is asked for. */
export function ChangePasswordForm({
  action,
}: {
  action: (input: {
    currentPassword: string;
    newPassword: string;
    submissionKey: string;
  }) => Promise<ActionResult>;
}) {
  const state = useActionForm({
    schema: () => import('@/lib/schemas/account').then((module) => module.changePasswordSchema),
    action,
    defaultValues: { currentPassword: '', newPassword: '' },
    clearWhenSaved: true,
  });
  return (
    <ActionForm
      state={state}
      label="Change password"
      saved="Your password is changed. Your other sessions have ended."
    >
      <PasswordField name="currentPassword" label="Present password" autoComplete="current-password" />
      <PasswordField
        name="newPassword"
        label="New password"
        help={`At least ${SHORTEST_PASSWORD} characters. You sign with it too.`}
        autoComplete="new-password"
      />
      <div>
        <SubmitButton pendingLabel="Changing…">Change password</SubmitButton>
      </div>
    </ActionForm>
  );
}
