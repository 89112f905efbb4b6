'use server';

import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import { runTrialAction } from '@/lib/server/action';

/** Reserves a place of the open cohort for a subject of one's own site. */
export async function reserveSlot(input: TrialFormInput<'reserve-slot'>) {
  return runTrialAction('reserve-slot', input);
}

/** Gives a reserved place back, with a reason. */
export async function releaseSlot(input: TrialFormInput<'release-slot'>) {
  return runTrialAction('release-slot', input);
}

/** Records when a subject was dosed, and the dose really given. */
export async function recordDosing(input: TrialFormInput<'record-dosing'>) {
  return runTrialAction('record-dosing', input);
}

/** Records the outcome of a dosed subject. */
export async function recordOutcome(input: TrialFormInput<'record-outcome'>) {
  return runTrialAction('record-outcome', input);
}

/** Corrects a recorded outcome, with a reason; old and new are kept. */
export async function correctOutcome(input: TrialFormInput<'correct-outcome'>) {
  return runTrialAction('correct-outcome', input);
}

/** Resubmits a returned cohort: the recommendation is computed anew. */
export async function resubmitCohort(input: TrialFormInput<'resubmit-cohort'>) {
  return runTrialAction('resubmit-cohort', input);
}
