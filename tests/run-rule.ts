import type { RuleSettings } from '@/lib/schemas/design';
import { ruleOf } from '@/lib/design/rules/registry';
import { STEP } from '@/lib/design/rules/rule';
import { GUARD, RULE, TrialState } from '@/lib/design/trial-state';

/** What a rule is run on, as the reference files give it: all values on the working scale. */
export interface RuleRun {
  target: number;
  x1: number;
  /** Responses of each cohort; may be fractional where a check value has continuous outcomes. */
  responses: readonly number[];
  sizes: number | readonly number[];
  /** Projection of what is carried. */
  lowest?: number;
  highest?: number;
  sign?: 1 | -1;
  /** The dose really given, from the assigned value; default the assigned value itself. */
  given?: (assigned: number, cohort: number) => number;
  lowered?: (cohort: number) => boolean;
}

/** The values of a run: x_1 … x_{K+1}, raw values, and the registers after each step. */
export interface RuleRunResult {
  x: number[];
  raw: number[];
  registers: Float64Array[];
  given: number[];
}

/** Runs one rule's own step code cohort by cohort, carrying its values as METHODS steps 1 and 3 say. */
export function runRule(settings: RuleSettings, run: RuleRun): RuleRunResult {
  const { target, x1, responses, sizes, lowest = -Infinity, highest = Infinity, sign = 1 } = run;
  const rule = ruleOf(settings.name);
  const trial = new TrialState(responses.length, 0, responses.length);
  rule.initialise(settings, sign * x1, trial);
  const result: RuleRunResult = { x: [x1], raw: [], registers: [], given: [] };
  responses.forEach((y, i) => {
    const m = typeof sizes === 'number' ? sizes : (sizes[i] as number);
    const assigned = result.x[i] as number;
    const given = run.given?.(assigned, i + 1) ?? assigned;
    result.given.push(given);
    trial.beginCohort();
    trial.addSubjects(given, m, y);
    trial.closeCohort(sign);
    trial.guard[GUARD.GIVEN] = given;
    trial.lowered = run.lowered?.(i + 1) ?? false;
    const status = rule.step({ settings, target, sign }, trial);
    if (status !== STEP.done) throw new Error(`Step ${i + 1} ended with status ${status}.`);
    const raw = sign * (trial.rule[RULE.NEXT] as number);
    const projected = Math.min(Math.max(raw, lowest), highest);
    trial.rule[RULE.X] = sign * (rule.carriesProjected(settings) ? projected : raw);
    result.raw.push(raw);
    result.x.push(projected);
    result.registers.push(Float64Array.from(trial.rule));
  });
  return result;
}
