import { type Refusal, RefusedError } from '@/lib/errors';
import type { InstallationEventPayload, InstallationRole } from './events';

/** All that a decision about the installation takes from outside: clock, actor and ids, passed in. */
export interface InstallationContext {
  /** ISO 8601 UTC with milliseconds. */
  readonly now: string;
  readonly actor: { readonly personId: string | null; readonly role: InstallationRole };
  readonly newId: () => string;
}

/** Refuses what was asked: the sentence says what is wrong, what holds and what to do. */
export function refuse(
  code: Refusal['code'],
  message: string,
  fields?: Readonly<Record<string, string>>,
): never {
  throw new RefusedError({ code, message, ...(fields ? { fields } : {}) });
}

/** Refuses any actor but an administrator: what only an administrator may see does not exist for others. */
export function requireAdministrator(context: InstallationContext): void {
  if (context.actor.role !== 'administrator' || context.actor.personId === null) {
    refuse('not-found', 'This page does not exist, or you have no access to it.');
  }
}

/** What a decision about the installation brings about, in order. */
export type InstallationPayloads = readonly InstallationEventPayload[];
