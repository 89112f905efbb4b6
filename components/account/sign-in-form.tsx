'use client';

import { useState } from 'react';
import { ActionForm } from '@/components/forms/action-form';
import { PasswordField } from '@/components/forms/password-field';
import { SubmitButton } from '@/components/forms/submit-button';
import { TextField } from '@/components/forms/text-field';
import { useActionForm } from '@/components/forms/use-action-form';
import { Section, TwoColumns } from '@/components/layout/section';
import { Button } from '@/components/ui/button';
import type { ActionResult } from '@/lib/schemas/action-result';

/** An account of the demonstration, shown to everybody who comes to its sign-in page. */
interface DemoAccount {
  readonly email: string;
  readonly password: string;
  readonly printedName: string;
  readonly description: string;
}

async function prove({ email, password }: { email: string; password: string }): Promise<ActionResult> {
  const { signIn } = await import('next-auth/react');
  const answer = await signIn('credentials', { email, password, redirect: false, callbackUrl: '/today' });
  if (answer?.ok && !answer.error) return { ok: true, value: undefined };
  return {
    ok: false,
    code: 'wrong-credentials',
    message: answer?.error ?? 'The server did not answer. Try again.',
  };
}

/**
 * Address and password, and beside them the accounts of a demonstration.
 * @param next where to go after signing in, an address of this installation
 */
export function SignInForm({ next, accounts }: { next: string; accounts: readonly DemoAccount[] }) {
  const state = useActionForm({
    schema: () => import('@/lib/schemas/sign-in').then((module) => module.signInSchema),
    action: prove,
    defaultValues: { email: '', password: '' },
    // The whole page is loaded anew: nothing a visitor saw is kept.
    onSaved: () => window.location.assign(next),
  });
  const form = (
    <Section title="Your account" raised>
      <ActionForm state={state} label="Sign in">
        <TextField
          name="email"
          type="email"
          label="E-mail address"
          autoComplete="username"
          autoCapitalize="none"
          spellCheck={false}
        />
        <PasswordField name="password" label="Password" autoComplete="current-password" />
        <div className="flex flex-wrap items-center gap-x-5 gap-y-2">
          <SubmitButton variant="primary" pendingLabel="Signing in…">
            Sign in
          </SubmitButton>
          <a href="/forgotten-password" className="text-sm text-water underline underline-offset-3">
            Forgotten password
          </a>
        </div>
      </ActionForm>
    </Section>
  );
  if (accounts.length === 0) return <div className="max-w-md">{form}</div>;
  return (
    <TwoColumns>
      <div>{form}</div>
      <DemoAccounts
        accounts={accounts}
        onChoose={({ email, password }) => {
          state.form.clearErrors();
          state.form.setValue('email', email);
          state.form.setValue('password', password);
        }}
      />
    </TwoColumns>
  );
}

function DemoAccounts({
  accounts,
  onChoose,
}: {
  accounts: readonly DemoAccount[];
  onChoose: (account: DemoAccount) => void;
}) {
  const [chosen, setChosen] = useState<DemoAccount | null>(null);
  return (
    <Section title="Demonstration accounts">
      <p className="text-sm text-ink-soft">
        This installation holds invented trials and people. Choose who to be; every account has the password{' '}
        <code>{accounts[0]?.password}</code>.
      </p>
      <ul className="mt-2">
        {accounts.map((account) => (
          <li
            key={account.email}
            className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-3 border-b border-line py-1.75"
          >
            <span className="leading-snug">
              {account.printedName}
              <span className="block text-sm text-ink-soft">{account.description}</span>
            </span>
            <Button
              small
              aria-label={`Fill in the account of ${account.printedName}`}
              aria-pressed={chosen?.email === account.email}
              onClick={() => {
                setChosen(account);
                onChoose(account);
              }}
            >
              Fill in
            </Button>
          </li>
        ))}
      </ul>
      <p role="status" className="sr-only">
        {chosen ? `Address and password of ${chosen.printedName} are filled in.` : ''}
      </p>
    </Section>
  );
}
