import type { Design, RuleSettings } from '@/lib/schemas/design';
import { ClosingCriterion } from './closing';
import { doseSetOf, type DoseSet } from './dose-set';
import { ruleOf } from './rules/registry';
import type { AnyRule, StepContext } from './rules/rule';
import { signOf, toWorking } from './scale';
import { PLACE, TrialState } from './trial-state';

/** Places in {@link CompiledDesign.bounds}. */
export const BOUND = { RISE_TIMES: 0, RISE_ADD: 1, LOWEST: 2, HIGHEST: 3 } as const;

/** A design made ready for steps: doses by index, numbers on the working scale, the rule bound to its settings. */
export interface CompiledDesign {
  readonly design: Design;
  readonly doses: DoseSet;
  readonly rule: AnyRule;
  readonly context: StepContext<RuleSettings>;
  readonly carriesProjected: boolean;
  readonly sign: 1 | -1;
  readonly target: number;
  /** w(starting dose). */
  readonly start: number;
  readonly startIndex: number;
  /** Steps 2 and 3 by {@link BOUND}: x ≤ g × times + add, and the projection to [lowest, highest]. */
  readonly bounds: Float64Array;
  readonly tiesHigher: boolean;
  readonly closing: ClosingCriterion | null;
}

/** Prepares a validated design. Throws a RangeError for one its schema would have refused. */
export function compileDesign(design: Design): CompiledDesign {
  const doses = doseSetOf(design.doses, design.scale);
  const startIndex = doses.indexOf(design.startingDose);
  if (startIndex < 0) throw new RangeError('The starting dose is no dose of the design.');
  const sign = signOf(design);
  const rule = ruleOf(design.rule.name);
  const { projection, closing } = design.guardrails;
  return {
    design,
    doses,
    rule,
    context: { settings: design.rule, target: design.target, sign },
    carriesProjected: rule.carriesProjected(design.rule),
    sign,
    target: design.target,
    start: doses.working(startIndex),
    startIndex,
    bounds: Float64Array.of(
      ...riseOf(design),
      projection?.lowest ?? doses.working(0),
      projection?.highest ?? doses.working(doses.count - 1),
    ),
    tiesHigher: design.guardrails.ties === 'higher',
    closing: closing === null ? null : new ClosingCriterion(closing, design.target),
  };
}

/**
 * The state of a trial before its first cohort. Its buffers hold the design's largest trial; longer histories grow them.
 */
export function newTrial(compiled: CompiledDesign): TrialState {
  const { design, doses } = compiled;
  const levels = doses.kind === 'levels' ? doses.count : 0;
  const groups = Math.min(doses.count, design.maximumCohorts);
  const trial = new TrialState(design.maximumCohorts, levels, groups);
  startTrial(compiled, trial);
  return trial;
}

/** Puts a state back to before the first cohort. */
export function startTrial(compiled: CompiledDesign, trial: TrialState): void {
  trial.clear();
  trial.place[PLACE.FINAL] = compiled.startIndex;
  trial.place[PLACE.CLOSED_FROM] = compiled.doses.count;
  trial.iterates[0] = compiled.start;
  startRule(compiled, trial, compiled.start);
}

/** Starts the rule at x_1 (real working value): gain index 1 next. */
export function startRule(compiled: CompiledDesign, trial: TrialState, x1: number): void {
  compiled.rule.initialise(compiled.design.rule, compiled.sign * x1, trial);
}

/** Step 2 as g ↦ g × times + add, [times, add]; without a bound the result is infinite. */
function riseOf({ guardrails, scale }: Design): [times: number, add: number] {
  const rise = guardrails.largestRise;
  if (rise === null) return [1, Infinity];
  if (rise.kind === 'step') return [1, rise.step];
  return scale === 'log' ? [1, Math.log(rise.factor)] : [rise.factor, 0];
}

/** w(d) of a dose on this design's scale. */
export function workingOf(compiled: CompiledDesign, dose: number): number {
  return toWorking(compiled.design.scale, dose);
}
