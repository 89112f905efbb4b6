import { type Refusal, RefusedError } from '@/lib/errors';
import type { TrialRole } from '@/lib/policy/roles';
import type { TrialCommandType, TrialInput } from '@/lib/schemas/trial-inputs';
import type { TrialEvent, TrialEventPayload } from './events';
import { evolve } from './evolve';
import type { Instant, TrialState } from './state';

/** A command with its parsed input. */
export type TrialCommand = {
  [Type in TrialCommandType]: { readonly type: Type; readonly input: TrialInput<Type> };
}[TrialCommandType];

/** Who acts, in which role: a role of the trial, the administrator, or the server by itself. */
export interface DecisionActor {
  readonly personId: string | null;
  readonly printedName: string;
  readonly role: TrialRole | 'administrator' | 'system';
}

/** All that a decision takes from outside: clock, ids, hash and the version of the software, passed in. */
export interface DecisionContext {
  readonly now: Instant;
  readonly actor: DecisionActor;
  readonly newId: () => string;
  readonly sha256: (text: string) => string;
  readonly softwareVersion: string;
}

export type Decision =
  | { readonly ok: true; readonly events: readonly TrialEvent[]; readonly state: TrialState }
  | { readonly ok: false; readonly refusal: Refusal };

/** Refuses what was asked: the sentence says what is wrong, what holds and what to do. */
export function refuse(
  code: Refusal['code'],
  message: string,
  fields?: Readonly<Record<string, string>>,
): never {
  throw new RefusedError({ code, message, ...(fields ? { fields } : {}) });
}

/** A decision in the making: the events so far and the state after them. */
export class Deciding {
  readonly events: TrialEvent[] = [];
  state: TrialState;
  readonly context: DecisionContext;

  constructor(state: TrialState, context: DecisionContext) {
    this.state = state;
    this.context = context;
  }

  /** Adds an event of the actor and moves the state on. */
  emit(payload: TrialEventPayload): void {
    const { actor, now } = this.context;
    const event: TrialEvent = { occurredAt: now, personId: actor.personId, role: actor.role, payload };
    this.events.push(event);
    this.state = evolve(this.state, event);
  }
}
