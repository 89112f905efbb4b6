import type { Deciding } from '../decision';
import { computeRecommendation } from '../recommendation-record';
import { currentCohort, isComplete } from '../trial-facts';

/**
 * Completes the open cohort when its last outcome is in, and computes the recommendation that follows, in the same
 * decision. A cohort reopened for records completes when its sites resubmit it, not by itself.
 */
export function completeCohortIfDue(deciding: Deciding): void {
  const cohort = currentCohort(deciding.state);
  if (cohort === null || cohort.state !== 'open' || cohort.isRecordsOnly) return;
  if (deciding.state.trial.state === 'halted' || !isComplete(deciding.state, cohort)) return;
  completeCohort(deciding, cohort.id);
}

/** Puts a complete cohort under review with a new recommendation for the one after it. */
export function completeCohort(deciding: Deciding, cohortId: string): void {
  deciding.emit({ kind: 'cohort-completed', cohortId });
  recomputeForCohort(deciding, cohortId);
}

/** Computes a (new revision of the) recommendation that follows a cohort under review. */
export function recomputeForCohort(deciding: Deciding, cohortId: string): void {
  const cohort = deciding.state.cohorts[cohortId];
  const version = cohort && deciding.state.designVersions[cohort.designVersionId];
  if (!cohort || !version) throw new Error(`Cohort ${cohortId} has no design version.`);
  computeRecommendation(deciding, version, cohort.number + 1);
}
