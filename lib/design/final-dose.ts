import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import type { CompiledDesign } from './compiled';
import { nearestIndex } from './dose-set';
import { estimateTarget } from './estimate/estimate';
import type { TargetEstimate } from './estimate/target-estimate';
import type { History } from './history';
import { estimationData } from './precision';
import { replay, type DesignVersion } from './replay';
import { success, type DesignFailure, type Result } from './result';
import { PLACE, type TrialState } from './trial-state';

/** The final dose of a trial, with each step from the estimate to it. */
export interface FinalDose {
  /** The design's final estimator on all data, or the reason why there is no estimate. */
  readonly estimate: TargetEstimate;
  /** Step 4: the dose nearest the estimate. Null without an estimate. */
  readonly rounded: Dose | null;
  /** Step 5: the same with no untested level skipped. */
  readonly reachable: Dose | null;
  /** Step 7: the final dose, below every closed one. Null without an estimate or when every dose is closed. */
  readonly dose: Dose | null;
  /** The lowest closed dose; null when none is. */
  readonly closedFrom: Dose | null;
  /** True when the estimate lies above the highest open dose, to be said beside it. */
  readonly aboveOpenDoses: boolean;
  /** Evaluable subjects really given exactly the final dose; 0 is shown as "not given to anyone". */
  readonly subjectsGiven: number;
}

/**
 * The final dose of a trial: its final estimate taken through METHODS steps 4, 5 and 7.
 *
 * @param seed of a bootstrap interval, default the estimators' own.
 */
export function finalDose(design: Design, history: History, seed?: number): Result<FinalDose, DesignFailure> {
  return finalDoseUnder([{ fromCohort: 1, design }], history, seed);
}

/** The same for a trial whose design was amended: estimator and steps are those of the version of the last cohort. */
export function finalDoseUnder(
  versions: readonly DesignVersion[],
  history: History,
  seed?: number,
): Result<FinalDose, DesignFailure> {
  const replayed = replay(versions, history);
  if (!replayed.ok) return replayed;
  const { compiled, trial } = replayed.value;
  const estimate = estimateTarget(
    compiled.design,
    estimationData(compiled, trial),
    seed === undefined ? {} : { seed },
  );
  return success(placed(compiled, trial, estimate));
}

function placed(compiled: CompiledDesign, trial: TrialState, estimate: TargetEstimate): FinalDose {
  const { doses, design } = compiled;
  const closedFrom = trial.place[PLACE.CLOSED_FROM] as number;
  const closed = closedFrom < doses.count ? doses.dose(closedFrom) : null;
  if (estimate.x === null) {
    return {
      estimate,
      rounded: null,
      reachable: null,
      dose: null,
      closedFrom: closed,
      aboveOpenDoses: false,
      subjectsGiven: 0,
    };
  }
  const rounded = nearestIndex(doses, estimate.x, compiled.tiesHigher);
  const rule = design.guardrails.noSkipping;
  const limit =
    rule === 'off' || doses.kind === 'range'
      ? doses.count - 1
      : (trial.place[rule === 'current' ? PLACE.CURRENT : PLACE.TRIED] as number) + 1;
  const reachable = Math.min(rounded, limit);
  const final = Math.min(reachable, closedFrom - 1);
  return {
    estimate,
    rounded: doses.dose(rounded),
    reachable: doses.dose(reachable),
    dose: final < 0 ? null : doses.dose(final),
    closedFrom: closed,
    aboveOpenDoses: closed !== null && (closedFrom === 0 || estimate.x > doses.working(closedFrom - 1)),
    subjectsGiven: final < 0 ? 0 : subjectsGiven(trial, doses.working(final)),
  };
}

function subjectsGiven(trial: TrialState, x: number): number {
  for (let i = 0; i < trial.groups; i += 1) {
    if (trial.groupX[i] === x) return trial.groupN[i] as number;
  }
  return 0;
}
