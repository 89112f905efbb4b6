'use client';

import { useRouter } from 'next/navigation';
import { ActionForm } from '@/components/forms/action-form';
import { PasswordField } from '@/components/forms/password-field';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import type { ActionResult } from '@/lib/schemas/action-result';
import { SHORTEST_PASSWORD } from '@/lib/schemas/password-length';

type Input = { token: string; email?: string; printedName?: string; password: string; submissionKey: string };

/** What a link asks for: everybody chooses a password, an invited person may correct their name. */
const WORDS = {
  'first-administrator': { label: 'Create the first administrator', button: 'Create account' },
  invitation: { label: 'Accept the invitation', button: 'Set password' },
  'password-reset': { label: 'Choose a new password', button: 'Set new password' },
} as const;

/**
 * The form of a single-use link. Nothing is done by opening its page: the link is used by sending this.
 * @param person the name and address of an invited person, or of one who forgot their password
 */
export function LinkForm({
  purpose,
  token,
  person,
  action,
}: {
  purpose: keyof typeof WORDS;
  token: string;
  person: { email: string; printedName: string } | null;
  action: (input: Input) => Promise<ActionResult<{ personId: string; email: string }>>;
}) {
  const router = useRouter();
  const isFirst = purpose === 'first-administrator';
  const asksName = purpose !== 'password-reset';
  const state = useActionForm({
    schema: () =>
      import('@/lib/schemas/accept-link').then(({ setPasswordSchema }) => setPasswordSchema[purpose]),
    action: (input) => action({ ...input, token }),
    defaultValues: {
      ...(isFirst ? { email: '' } : {}),
      ...(asksName ? { printedName: person?.printedName ?? '' } : {}),
      password: '',
    },
    onSaved: () => router.push('/sign-in?because=password-set'),
  });
  const words = WORDS[purpose];
  return (
    <div className="max-w-md">
      <ActionForm state={state} label={words.label}>
        {isFirst ? (
          <TextField
            name="email"
            type="email"
            label="E-mail address"
            help="You sign in and sign with it."
            autoComplete="username"
            autoCapitalize="none"
            spellCheck={false}
          />
        ) : null}
        {asksName ? (
          <TextField
            name="printedName"
            label="Printed name"
            help="As it stands beside what you record and sign."
            autoComplete="name"
          />
        ) : null}
        {person ? (
          // For password managers: whose password this is.
          <input type="hidden" name="username" autoComplete="username" value={person.email} readOnly />
        ) : null}
        <PasswordField
          name="password"
          label="New password"
          help={`At least ${SHORTEST_PASSWORD} characters. Several words that do not belong together are easy to keep; no rules beyond that.`}
          autoComplete="new-password"
        />
        <div>
          <SubmitButton variant="primary" pendingLabel="Setting…">
            {words.button}
          </SubmitButton>
        </div>
      </ActionForm>
    </div>
  );
}
