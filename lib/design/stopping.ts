import type { CompiledDesign } from './compiled';
import { isPrecisionReached } from './precision';
import type { StopReason } from './trace/line';
import { PLACE, type TrialState } from './trial-state';

/** Flags of `TrialState.stop`, in the order METHODS step 8 names the reasons. */
export const STOP = {
  closedAll: 1,
  maximumCohorts: 2,
  maximumSubjects: 4,
  repeated: 8,
  precision: 16,
} as const;

const REASONS: readonly (readonly [number, StopReason])[] = [
  [STOP.closedAll, 'closed-all'],
  [STOP.maximumCohorts, 'maximum-cohorts'],
  [STOP.maximumSubjects, 'maximum-subjects'],
  [STOP.repeated, 'repeated'],
  [STOP.precision, 'precision'],
];

/** METHODS step 8: all reasons to stop that hold after the last cohort, as flags in `trial.stop`. */
export function judgeStop(compiled: CompiledDesign, trial: TrialState): void {
  const { design } = compiled;
  const { stopping } = design;
  let stop = 0;
  if ((trial.place[PLACE.FINAL] as number) < 0) stop |= STOP.closedAll;
  if (trial.cohorts >= design.maximumCohorts) stop |= STOP.maximumCohorts;
  if (stopping.maximumSubjects !== null && trial.subjects + design.cohortSize > stopping.maximumSubjects) {
    stop |= STOP.maximumSubjects;
  }
  if (stopping.repeated !== null && trial.repeats >= stopping.repeated.times) {
    if (subjectsGivenFinal(compiled, trial) >= stopping.repeated.subjects) stop |= STOP.repeated;
  }
  if (stopping.precision !== null && isPrecisionReached(compiled, trial, stopping.precision)) {
    stop |= STOP.precision;
  }
  trial.stop = stop;
}

/** Evaluable subjects really given exactly the recommended dose. */
export function subjectsGivenFinal(compiled: CompiledDesign, trial: TrialState): number {
  const index = trial.place[PLACE.FINAL] as number;
  if (index < 0) return 0;
  const x = compiled.doses.working(index);
  for (let i = 0; i < trial.groups; i += 1) {
    if (trial.groupX[i] === x) return trial.groupN[i] as number;
  }
  return 0;
}

/** The reasons held in a sum of flags, in METHODS' order. */
export function stopReasons(flags: number): StopReason[] {
  return REASONS.filter(([flag]) => (flags & flag) !== 0).map(([, reason]) => reason);
}
