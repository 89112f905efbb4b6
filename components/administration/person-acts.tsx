import type { ReactNode } from 'react';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';
import { ActForm } from './act-form';

type Act = (input: { personId: string } & Submission) => Promise<ActionResult<unknown>>;

function Line({ children, what }: { children: ReactNode; what: string }) {
  return (
    <div className="grid gap-x-6 gap-y-2 border-b border-line py-3 last:border-b-0 md:grid-cols-[minmax(0,1fr)_17rem]">
      <p className="max-w-prose text-ink-soft">{what}</p>
      {children}
    </div>
  );
}

/** What an administrator may do about an account, by its state. */
export function PersonActs({
  person: { personId, printedName, state },
  isOneself,
  actions,
}: {
  person: { personId: string; printedName: string; state: 'invited' | 'active' | 'disabled' };
  isOneself: boolean;
  actions: { resendInvitation: Act; resetPassword: Act; disablePerson: Act; enablePerson: Act };
}) {
  const values = { personId };
  if (state === 'disabled') {
    return (
      <Line what="Gives the account back as it was: with its old password, or waiting for a new invitation. Nobody is signed in by it.">
        <ActForm
          act="enable-person"
          values={values}
          action={actions.enablePerson}
          name={`Enable the account of ${printedName}`}
          label="Enable account"
          pendingLabel="Enabling…"
          variant="primary"
        />
      </Line>
    );
  }
  return (
    <>
      {state === 'invited' ? (
        <Line what="Mails a new link; the one sent before stops working.">
          <ActForm
            act="resend-invitation"
            values={values}
            action={actions.resendInvitation}
            name={`Send the invitation of ${printedName} again`}
            label="Send invitation again"
            pendingLabel="Sending…"
            saved="A new link is on its way."
            variant="primary"
          />
        </Line>
      ) : (
        <Line what="Mails a link to choose a new password, for somebody who cannot sign in. The old password works until the link is used; then every session ends.">
          <ActForm
            act="reset-by-administrator"
            values={values}
            action={actions.resetPassword}
            name={`Mail ${printedName} a link for a new password`}
            label="Mail a link for a new password"
            pendingLabel="Sending…"
            saved="The link is on its way."
          />
        </Line>
      )}
      {isOneself ? (
        <p className="py-3 text-ink-soft">
          This is your own account; another administrator would have to disable it.
        </p>
      ) : (
        <Line what="Ends every session and link at once. It can be undone.">
          <ActForm
            act="disable-person"
            values={values}
            action={actions.disablePerson}
            name={`Disable the account of ${printedName}`}
            label="Disable account"
            pendingLabel="Disabling…"
            variant="danger"
          />
        </Line>
      )}
    </>
  );
}
