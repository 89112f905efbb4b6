'use client';

import { useRouter } from 'next/navigation';
import { useEffect, useRef, type ReactNode } from 'react';
import type { z } from 'zod';
import { type ActOutcome, useAct } from '@/components/forms/use-act';
import { Button, type ButtonVariant } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';
import type { InstallationInputSchemas } from '@/lib/schemas/installation-inputs';
import type { TrialFormSchemas } from '@/lib/schemas/trial-forms';

/** The acts that need no entries. */
type Acts = Pick<
  InstallationInputSchemas & TrialFormSchemas,
  | 'resend-invitation'
  | 'reset-by-administrator'
  | 'disable-person'
  | 'enable-person'
  | 'retry-mail'
  | 'end-membership'
>;
type Input<Act extends keyof Acts> = z.input<Acts[Act]>;

/** What stands in the way of an act; it takes the focus. */
function Refusal({ outcome }: { outcome: ActOutcome }) {
  const box = useRef<HTMLDivElement>(null);
  const failed = outcome.kind === 'refused' || outcome.kind === 'lost';
  useEffect(() => {
    if (failed) box.current?.focus();
  }, [failed, outcome]);
  if (!failed) return null;
  const refusal = outcome.kind === 'refused' ? outcome.refusal : null;
  return (
    <div ref={box} tabIndex={-1} className="mb-2">
      <Notice
        kind="refused"
        title={
          refusal?.message ??
          'No answer came from the server, so it is not known whether this was recorded. Send it again, it is recorded only once.'
        }
        reference={refusal?.reference}
      >
        {linesOf(refusal)}
      </Notice>
    </div>
  );
}

function linesOf(refusal: (ActOutcome & { kind: 'refused' })['refusal'] | null): ReactNode {
  if (refusal?.code === 'signed-out') {
    return (
      <a href="/sign-in" target="_blank" rel="noopener">
        Sign in in another tab
      </a>
    );
  }
  const sentences = Object.values(refusal?.fields ?? {});
  return sentences.length > 0 ? sentences.join(' ') : null;
}

/**
 * An act on one record that needs no entries: a button that says what it does, and the answer beside it. What the act
 * changed is read anew.
 * @param act the act, by which its values are typed
 * @param values the ids the act takes
 * @param name what screen readers call it, with the record's name
 * @param saved what is said once it is done
 */
export function ActForm<Act extends keyof Acts>({
  values,
  action,
  name,
  label,
  pendingLabel,
  saved,
  variant = 'secondary',
  small,
}: {
  act: Act;
  values: Input<Act>;
  action: (input: Input<Act> & Submission) => Promise<ActionResult<unknown>>;
  name: string;
  label: string;
  pendingLabel: string;
  saved?: string;
  variant?: ButtonVariant;
  small?: boolean;
}) {
  const router = useRouter();
  const { outcome, pending, ready, send } = useAct(action, () => router.refresh());
  return (
    // A form takes no width of its own in a cell of a table; this gives it the button's.
    <div className={small ? 'min-w-28' : undefined}>
      <form
        method="post"
        aria-label={name}
        onSubmit={(event) => {
          event.preventDefault();
          send(values);
        }}
      >
        <Refusal outcome={outcome} />
        <Button
          type="submit"
          variant={variant}
          small={small}
          pending={pending}
          pendingLabel={pendingLabel}
          disabled={!ready}
        >
          {label}
        </Button>
        {outcome.kind === 'saved' && saved ? (
          <div className="mt-4">
            <Notice kind="saved">{saved}</Notice>
          </div>
        ) : null}
      </form>
    </div>
  );
}
