import type { Dose } from '@/lib/schemas/dose';
import type { CompiledDesign } from './compiled';
import type { History } from './history';
import { replay, type DesignVersion, type ReplayOptions } from './replay';
import { success, type DesignFailure, type Result } from './result';
import { fromWorking } from './scale';
import { stopReasons } from './stopping';
import type { StopReason } from './trace/line';
import { GUARD, PLACE, type TrialState } from './trial-state';

/** A recommendation without its trace. */
export interface RecommendationSummary {
  readonly kind: 'dose' | 'stop';
  /** The recommended dose; null when every dose is closed. */
  readonly dose: Dose | null;
  /** The rule's raw value, working scale. */
  readonly nextValue: number;
  /** The same in dose units. */
  readonly nextDose: number;
  /** The lowest closed dose; null when none is. */
  readonly closedFrom: Dose | null;
  readonly stopReasons: readonly StopReason[];
}

/** Reads the summary from a trial's registers. */
export function summaryOf(compiled: CompiledDesign, trial: TrialState): RecommendationSummary {
  const { doses, design } = compiled;
  const final = trial.place[PLACE.FINAL] as number;
  const closedFrom = trial.place[PLACE.CLOSED_FROM] as number;
  const nextValue = trial.steps > 0 ? (trial.guard[GUARD.RAW] as number) : compiled.start;
  return {
    kind: trial.stop === 0 ? 'dose' : 'stop',
    dose: final < 0 ? null : doses.dose(final),
    nextValue,
    nextDose: fromWorking(design.scale, nextValue),
    closedFrom: closedFrom < doses.count ? doses.dose(closedFrom) : null,
    stopReasons: stopReasons(trial.stop),
  };
}

/** The recommendation after the last cohort of a history, without its trace; see `recommendUnder`. */
export function recommendationSummary(
  versions: readonly DesignVersion[],
  history: History,
  options: ReplayOptions = {},
): Result<RecommendationSummary, DesignFailure> {
  const replayed = replay(versions, history, options);
  return replayed.ok ? success(summaryOf(replayed.value.compiled, replayed.value.trial)) : replayed;
}
