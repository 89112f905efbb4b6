import type { Design, RuleName } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import type { CompiledDesign } from './compiled';
import type { History } from './history';
import { replay, type DesignVersion } from './replay';
import { success, type DesignFailure, type Result } from './result';
import { stopReasons } from './stopping';
import { computed, exactDose, type StopReason, type TraceLine } from './trace/line';
import { guardrailLines } from './trace/guardrail-lines';
import { stoppingLines } from './trace/stopping-lines';
import { GUARD, PLACE, RULE, type TrialState } from './trial-state';

/** The numbers a rule carries into the next cohort. */
export interface RuleState {
  readonly rule: RuleName;
  /** x carried, real working value. */
  readonly carried: number;
  /** The rule's own numbers by name; null where not defined. */
  readonly numbers: Readonly<Record<string, number | null>>;
}

/** What is recommended after the last completed cohort, with the way there. Plain data, fit for canonical text. */
export interface Recommendation {
  /** `stop` when a stopping rule holds; `dose` otherwise. */
  readonly kind: 'dose' | 'stop';
  /** The recommended dose; with `stop` the dose that would follow. Null when every dose is closed. */
  readonly dose: Dose | null;
  /** Number of completed cohorts, K; the recommendation is for cohort K + 1. */
  readonly afterCohort: number;
  /** Steps made, k: completed cohorts with an evaluable subject. */
  readonly stepIndex: number;
  /** The rule's raw value x_{k+1}, real working value; the start's before the first step. */
  readonly nextValue: number;
  /** The same after largest rise and projection (steps 2, 3). */
  readonly assignedValue: number;
  /** The value carried into the next step. */
  readonly carriedValue: number;
  /** The dose the guardrails took as current: nearest the lower of released and mean given. Null before the first step. */
  readonly currentDose: Dose | null;
  /** The lowest closed dose, null when none is; this dose and all above are closed. */
  readonly closedFrom: Dose | null;
  /** All reasons to stop that hold, in the order of METHODS step 8. */
  readonly stopReasons: readonly StopReason[];
  /** True when the last cohort had no evaluable subject, so that the recommendation before it stands. */
  readonly stands: boolean;
  readonly ruleState: RuleState;
  /** One line at least for every step, also where nothing changed. */
  readonly lines: readonly TraceLine[];
}

/**
 * The recommendation after the last completed cohort, METHODS steps 1 to 8, with its trace. Deterministic: same input, same
 * output, bit for bit. Before the first cohort it is the starting dose.
 *
 * @param design a validated design (`designSchema`). @param history completed cohorts with doses really given (in the trial's
 * unit, exact decimals) and the stored marks of lowered releases.
 * @returns the recommendation, or a typed failure: a history that does not fit the design (refused, never coerced), or an
 * overflow, NaN or fit that did not converge, with the state at which it arose.
 */
export function recommend(design: Design, history: History): Result<Recommendation, DesignFailure> {
  return recommendUnder([{ fromCohort: 1, design }], history);
}

/** The same for a trial whose design was amended; see {@link replay} for what goes on and what starts afresh. */
export function recommendUnder(
  versions: readonly DesignVersion[],
  history: History,
): Result<Recommendation, DesignFailure> {
  let stands = false;
  const replayed = replay(versions, history, {
    afterCohort: (_compiled, _trial, cohort) => {
      stands = cohort.given.length === 0;
    },
  });
  if (!replayed.ok) return replayed;
  const { compiled, trial } = replayed.value;
  return success(recommendationOf(compiled, trial, stands));
}

/** Reads the recommendation and its trace from a trial's registers. */
export function recommendationOf(
  compiled: CompiledDesign,
  trial: TrialState,
  stands: boolean,
): Recommendation {
  const { doses, sign } = compiled;
  const started = trial.steps > 0;
  const final = trial.place[PLACE.FINAL] as number;
  const closedFrom = trial.place[PLACE.CLOSED_FROM] as number;
  const carried = sign * (trial.rule[RULE.X] as number) + 0;
  return {
    kind: trial.stop === 0 ? 'dose' : 'stop',
    dose: final < 0 ? null : doses.dose(final),
    afterCohort: trial.cohorts,
    stepIndex: trial.steps,
    nextValue: started ? (trial.guard[GUARD.RAW] as number) : compiled.start,
    assignedValue: trial.iterates[trial.steps] as number,
    carriedValue: carried,
    currentDose: started ? doses.dose(trial.place[PLACE.CURRENT] as number) : null,
    closedFrom: closedFrom < doses.count ? doses.dose(closedFrom) : null,
    stopReasons: stopReasons(trial.stop),
    stands,
    ruleState: { rule: compiled.rule.name, carried, numbers: finiteNumbers(compiled, trial) },
    lines: traceLines(compiled, trial, stands),
  };
}

function finiteNumbers(compiled: CompiledDesign, trial: TrialState): Record<string, number | null> {
  return Object.fromEntries(
    Object.entries(compiled.rule.numbers(trial)).map(([name, value]) => [
      name,
      Number.isFinite(value) ? value : null,
    ]),
  );
}

function traceLines(compiled: CompiledDesign, trial: TrialState, stands: boolean): TraceLine[] {
  if (trial.steps === 0) {
    return [
      startingLine(compiled),
      ...(stands ? [standsLine(compiled, trial)] : []),
      ...stoppingLines(compiled, trial),
    ];
  }
  return [
    ...compiled.rule.explain(compiled.context, trial),
    ...guardrailLines(compiled, trial),
    ...(stands ? [standsLine(compiled, trial)] : []),
    ...stoppingLines(compiled, trial),
  ];
}

function startingLine(compiled: CompiledDesign): TraceLine {
  const dose = exactDose(compiled.design.startingDose);
  return {
    id: 'starting-dose',
    step: 1,
    symbol: { name: 'x', index: 1 },
    formula: compiled.design.scale === 'log' ? 'ln({dose}) = {x}' : '{x}',
    numbers: { dose, x: computed(compiled.start, 'x') },
    result: dose,
    acted: false,
    after: dose,
  };
}

function standsLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const final = trial.place[PLACE.FINAL] as number;
  return {
    id: 'stands',
    step: 7,
    formula: 'cohort {cohort} has no evaluable subject',
    numbers: { cohort: { value: trial.cohorts, form: 'exact' } },
    result: final < 0 ? { word: 'stop' } : exactDose(compiled.doses.dose(final)),
    acted: false,
    reason: { code: 'no-evaluable-subject', numbers: {} },
  };
}
