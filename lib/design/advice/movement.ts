import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { compileDesign, newTrial, type CompiledDesign } from '../compiled';
import { fromWorking } from '../scale';
import { STEP } from '../rules/rule';
import { completeCohort } from '../step';
import { STOP } from '../stopping';
import { GUARD, PLACE, RULE, type TrialState } from '../trial-state';

/** What happens if every cohort from a state on has only responses, or none. */
export interface RunAhead {
  /** Cohorts in a row until the recommended dose changes; null when it does not before the trial ends. */
  readonly cohorts: number | null;
  /** The dose it changes to; null when it does not, or when all doses are closed by then. */
  readonly to: Dose | null;
  /** True when more cohorts than remain would be needed: the dose is frozen in this direction. */
  readonly frozen: boolean;
  /** True when a stopping rule other than the maximum of cohorts ends the trial before the dose changes. */
  readonly stops: boolean;
}

/** Both directions from one state. */
export interface Movement {
  readonly allResponses: RunAhead;
  readonly noResponses: RunAhead;
}

/**
 * Runs cohorts of the design's size, all given the recommended dose, all with a response or none, until the recommended dose
 * changes or the trial ends.
 *
 * @param compiled the design. @param from a state of it, left as it is. @param scratch a state of the same design that is
 * overwritten. @param responses whether every subject responds, or none.
 */
export function runAhead(
  compiled: CompiledDesign,
  from: TrialState,
  scratch: TrialState,
  responses: boolean,
): RunAhead {
  const { design, doses } = compiled;
  scratch.copyFrom(from);
  const start = scratch.place[PLACE.FINAL] as number;
  const remaining = design.maximumCohorts - from.cohorts;
  const unmoved = (stops: boolean): RunAhead => ({ cohorts: null, to: null, frozen: true, stops });
  if (start < 0) return unmoved(true);
  const x = doses.working(start);
  for (let n = 1; n <= remaining; n++) {
    if ((scratch.stop & ~STOP.maximumCohorts) !== 0) return unmoved(true);
    scratch.beginCohort();
    scratch.addSubjects(x, design.cohortSize, responses ? design.cohortSize : 0);
    if (completeCohort(compiled, scratch, x, false) !== STEP.done) return unmoved(false);
    const final = scratch.place[PLACE.FINAL] as number;
    if (final !== start)
      return { cohorts: n, to: final < 0 ? null : doses.dose(final), frozen: false, stops: false };
  }
  return unmoved(false);
}

/**
 * Whether a trial can still move: how many all-response or no-response cohorts in a row change the recommended dose.
 *
 * @param compiled the design. @param trial its state, left as it is.
 */
export function movement(compiled: CompiledDesign, trial: TrialState): Movement {
  const scratch = newTrial(compiled);
  return {
    allResponses: runAhead(compiled, trial, scratch, true),
    noResponses: runAhead(compiled, trial, scratch, false),
  };
}

/** How far the rule moves its value, and when the dose follows, at one step of an even course at one dose. */
export interface StepAdvice extends Movement {
  /** k: the next cohort. */
  readonly step: number;
  /** Change of the rule's raw value (working scale) after a cohort of responses only, and of none. */
  readonly moveAllResponses: number;
  readonly moveNoResponses: number;
  /** The same in dose units from the dose: w⁻¹(x + move) − dose. */
  readonly doseMoveAllResponses: number;
  readonly doseMoveNoResponses: number;
}

/**
 * For k = 1 … K: how the trial could move from an even course, in which every earlier cohort was given `dose` and had
 * exactly the target proportion, so that the rule's value lies on that dose.
 *
 * @param design a validated design. @param dose one of its doses, default the starting dose.
 * @throws RangeError when `dose` is none of the design's.
 */
export function stepAdvice(design: Design, dose: Dose = design.startingDose): StepAdvice[] {
  // Stopping rules and closing look at data; on an imagined course they would only hide the rule's own movement.
  const course: Design = {
    ...design,
    startingDose: dose,
    stopping: { maximumSubjects: null, repeated: null, precision: null },
    guardrails: { ...design.guardrails, closing: null },
  };
  const compiled = compileDesign(course);
  const { sign, doses } = compiled;
  const trial = newTrial(compiled);
  const scratch = newTrial(compiled);
  const level = compiled.startIndex;
  const x = doses.working(level);
  const m = design.cohortSize;
  const advice: StepAdvice[] = [];
  for (let k = 1; k <= design.maximumCohorts; k++) {
    const move = (responses: boolean) => {
      scratch.copyFrom(trial);
      scratch.beginCohort();
      scratch.addSubjects(x, m, responses ? m : 0);
      completeCohort(compiled, scratch, x, false);
      return (scratch.guard[GUARD.RAW] as number) - x;
    };
    const moveAllResponses = move(true);
    const moveNoResponses = move(false);
    const value = fromWorking(design.scale, x);
    advice.push({
      step: k,
      moveAllResponses,
      moveNoResponses,
      doseMoveAllResponses: fromWorking(design.scale, x + moveAllResponses) - value,
      doseMoveNoResponses: fromWorking(design.scale, x + moveNoResponses) - value,
      allResponses: runAhead(compiled, trial, scratch, true),
      noResponses: runAhead(compiled, trial, scratch, false),
    });
    trial.beginCohort();
    trial.addSubjects(x, m, m * design.target);
    completeCohort(compiled, trial, x, false);
    trial.rule[RULE.X] = sign * x;
    trial.iterates[trial.steps] = x;
    trial.place[PLACE.FINAL] = level;
  }
  return advice;
}

/** When a rule that carries the dose given can no longer move between levels. */
export interface GivenFreeze {
  /** First k from which no cohort can raise the value by half the gap: a_k Γ ≤ gap/2; null within the cohorts planned. */
  readonly noRiseFrom: number | null;
  /** First k with a_k(1 − Γ) ≤ gap/2: no fall any more. */
  readonly noFallFrom: number | null;
}

/**
 * For a rule with gains c/(k + k0)^γ that carries on from the dose given on levels: the first k after which no single cohort
 * changes the level. The smallest gap of the levels is used, so that before it some move is possible.
 *
 * @param gainAtStep a_k. @param target Γ. @param gap gap between neighbouring levels, working scale. @param cohorts K.
 * @param sign 1 when response rises with dose, −1 when it falls (then responses raise the dose).
 */
export function givenFreeze(
  gainAtStep: (k: number) => number,
  target: number,
  gap: number,
  cohorts: number,
  sign: 1 | -1 = 1,
): GivenFreeze {
  const up = sign > 0 ? target : 1 - target;
  const first = (share: number) => {
    for (let k = 1; k <= cohorts; k++) if (gainAtStep(k) * share <= gap / 2) return k;
    return null;
  };
  return { noRiseFrom: first(up), noFallFrom: first(1 - up) };
}
