import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { type Deciding, refuse } from '../decision';
import { requirePermission } from '../permitted';
import { sign } from '../signature';
import {
  awaitingRecommendation,
  currentCohort,
  placesOf,
  standingHalt,
  standingSignatures,
} from '../trial-facts';
import { completeCohortIfDue, recomputeForCohort } from './completion';

/** Halts the trial at once: no reserving, dosing or release; a waiting packet is overtaken, its signatures lapse. */
export function haltTrial(deciding: Deciding, input: TrialInput<'halt-trial'>): void {
  requirePermission(deciding, 'trial.halt');
  const { state, context } = deciding;
  if (state.trial.state === 'halted') refuse('conflict', 'The trial is halted already.');
  if (state.trial.state !== 'open') {
    refuse('refused', 'Only an open trial can be halted; in this one nobody is being dosed.');
  }
  deciding.emit({ kind: 'trial-halted', haltId: context.newId(), reason: input.reason });
  const awaiting = awaitingRecommendation(state);
  if (awaiting) deciding.emit({ kind: 'recommendation-overtaken', recommendationId: awaiting.id });
}

const PLAN_WORDS = {
  continue: 'the open cohort continues at its dose',
  'close-short': 'the open cohort is closed short',
} as const;

/**
 * Signs the lifting of the halt with the plan for the open cohort; the quorum on one plan lifts. A cohort closed short
 * loses its undosed places and waits for every dosed subject; a packet overtaken by the halt is computed anew.
 */
export function signLift(deciding: Deciding, input: TrialInput<'sign-lift'>): void {
  requirePermission(deciding, 'trial.lift');
  const halt = standingHalt(deciding.state);
  if (halt === null || halt.id !== input.haltId) {
    refuse('conflict', 'Not signed. This halt no longer stands. Load the page again.');
  }
  const { context } = deciding;
  sign(
    deciding,
    { haltId: halt.id, digest: context.sha256(`${halt.id} ${halt.haltedAt} ${halt.reason}`) },
    {
      decision: input.plan,
      dose: null,
      reason: input.reason,
      meaning: `I lift the halt of ${deciding.state.trial.code}; ${PLAN_WORDS[input.plan]}.`,
    },
  );
  const onPlan = standingSignatures(deciding.state, halt.id).filter(
    (signature) => signature.decision === input.plan,
  );
  if (onPlan.length < deciding.state.trial.quorum) return;
  deciding.emit({ kind: 'trial-lifted', haltId: halt.id, plan: input.plan });
  const cohort = currentCohort(deciding.state);
  if (cohort === null) return;
  if (cohort.state === 'under-review') {
    recomputeForCohort(deciding, cohort.id);
    return;
  }
  if (input.plan === 'close-short' && !cohort.isRecordsOnly) {
    const undosed = placesOf(deciding.state, cohort.id).filter((subject) => subject.state === 'reserved');
    deciding.emit({
      kind: 'cohort-closed-short',
      cohortId: cohort.id,
      cancelledSubjectIds: undosed.map((subject) => subject.id),
    });
  }
  completeCohortIfDue(deciding);
}
