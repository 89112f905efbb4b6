'use client';

import { unstable_rethrow } from 'next/navigation';
import { useRef, useState, useSyncExternalStore, useTransition } from 'react';
import type { ActionRefusal, ActionResult, Submission } from '@/lib/schemas/action-result';

/** How the last attempt ended. `lost`: no answer came, so nobody knows whether it was recorded. */
export type ActOutcome =
  | { readonly kind: 'none' | 'lost' | 'saved' }
  | { readonly kind: 'refused'; readonly refusal: ActionRefusal };

const never = () => () => {};

/**
 * An act without entries, sent to its action: once per submission key, which stays the same until it is known to be
 * recorded. The action checks what is sent; there is nothing here that a person could mend.
 * @param action takes the values with a submission key
 * @param onSaved called once the act is recorded
 */
export function useAct<Values extends object>(
  action: (input: Values & Submission) => Promise<ActionResult<unknown>>,
  onSaved: () => void,
): { outcome: ActOutcome; pending: boolean; ready: boolean; send: (values: Values) => void } {
  const ready = useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
  const submissionKey = useRef<string | null>(null);
  const underWay = useRef(false);
  const [pending, startTransition] = useTransition();
  const [outcome, setOutcome] = useState<ActOutcome>({ kind: 'none' });

  async function attempt(values: Values) {
    submissionKey.current ??= crypto.randomUUID();
    let result: ActionResult<unknown>;
    try {
      result = await action({ ...values, submissionKey: submissionKey.current });
    } catch (error) {
      unstable_rethrow(error);
      setOutcome({ kind: 'lost' });
      return;
    } finally {
      underWay.current = false;
    }
    if (!result.ok) {
      setOutcome({ kind: 'refused', refusal: result });
      return;
    }
    submissionKey.current = null;
    setOutcome({ kind: 'saved' });
    onSaved();
  }

  function send(values: Values) {
    if (underWay.current) return;
    underWay.current = true;
    startTransition(() => attempt(values));
  }
  return { outcome, pending, ready, send };
}
