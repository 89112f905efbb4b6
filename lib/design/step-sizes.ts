import type { Design, RuleSettings } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { decimalToNumber } from './decimal';
import { doseSetOf } from './dose-set';
import { ruleOf } from './rules/registry';
import { gainAt } from './rules/robbins-monro';
import { fromWorking, signOf, toWorking } from './scale';
import { RULE, TrialState } from './trial-state';

/** How far step k would move the value from a dose, working scale and dose units. */
export interface StepSize {
  readonly k: number;
  /** a_k; for virtual observations and the adaptive slope 1/(k b), for the logit rule c/k where it has no fit. */
  readonly gain: number;
  /** The value after a cohort without and with nothing but responses, before any guardrail. */
  readonly afterNone: number;
  readonly afterAll: number;
  readonly doseAfterNone: number;
  readonly doseAfterAll: number;
}

/**
 * The first `count` steps of a design shown around a dose: where the raw value would go after a cohort with no response and
 * after one with nothing but responses, were it at that dose before step k. Kesten's index is taken as k (a change of sign in
 * every cohort); the adaptive slope as its initial slope; the logit rule as its step without a fit.
 *
 * @param around a dose of the design's unit. @param count at least 1.
 */
export function stepSizes(design: Design, around: Dose, count: number): StepSize[] {
  const x = toWorking(design.scale, decimalToNumber(around));
  const sign = signOf(design);
  return gains(design, count).map(({ gain, centre }, i) => {
    const afterNone = x + sign * gain * centre;
    const afterAll = x - sign * gain * (1 - centre);
    return {
      k: i + 1,
      gain,
      afterNone,
      afterAll,
      doseAfterNone: fromWorking(design.scale, afterNone),
      doseAfterAll: fromWorking(design.scale, afterAll),
    };
  });
}

/** The gain of each step and the proportion at which it does not move: Γ, or b_k for Joseph's rule. */
function gains(design: Design, count: number): { gain: number; centre: number }[] {
  const { rule, target } = design;
  const steps = Array.from({ length: count }, (_, i) => i + 1);
  switch (rule.name) {
    case 'robbins-monro':
    case 'kesten':
      return steps.map((k) => ({ gain: gainAt(rule, k), centre: target }));
    case 'virtual-observations':
      return steps.map((k) => ({ gain: 1 / (k * rule.slope), centre: target }));
    case 'adaptive-slope': {
      const slope = Math.min(Math.max(rule.initialSlope, rule.slopeLow), rule.slopeHigh);
      return steps.map((k) => ({ gain: 1 / (k * slope), centre: target }));
    }
    case 'logit-ml':
      return steps.map((k) => ({ gain: rule.c / k, centre: target }));
    case 'joseph':
      return josephGains(rule, target, design.cohortSize, count);
  }
}

function josephGains(rule: RuleSettings, target: number, m: number, count: number) {
  const joseph = ruleOf('joseph');
  const trial = new TrialState(count, 0, 1);
  joseph.initialise(rule, 0, trial);
  return Array.from({ length: count }, () => {
    trial.beginCohort();
    trial.addSubjects(0, m, 0);
    trial.closeCohort(1);
    joseph.step({ settings: rule, target, sign: 1 }, trial);
    return {
      gain: trial.rule[RULE.GAIN] as number,
      centre: joseph.numbers(trial).expected as number,
    };
  });
}

/** From which step on a rule that carries the dose given cannot leave a level upward and downward. */
export interface Freeze {
  /** The two neighbouring levels. */
  readonly low: Dose;
  readonly high: Dose;
  /** First k from which no cohort can move from `low` up to `high`: a_k times the largest pull up ≤ gap/2. */
  readonly noRise: number;
  /** First k from which no cohort can move from `high` down to `low`. */
  readonly noFall: number;
}

/**
 * Where Robbins & Monro's or Kesten's rule carries the dose given on levels: for each pair of neighbouring levels the first k
 * with a_k Γ ≤ gap/2 (no rise any more) and with a_k (1 − Γ) ≤ gap/2 (no fall). Empty for other designs. Kesten's index is
 * taken as k, so the freeze comes no sooner than shown.
 */
export function freezes(design: Design): Freeze[] {
  const { rule, target } = design;
  if (design.doses.kind !== 'levels') return [];
  if (!('carry' in rule) || rule.carry !== 'given') return [];
  if (rule.name === 'adaptive-slope') return [];
  const doses = doseSetOf(design.doses, design.scale);
  const rising = signOf(design) > 0;
  return Array.from({ length: doses.count - 1 }, (_, i) => {
    const gap = doses.working(i + 1) - doses.working(i);
    return {
      low: doses.dose(i),
      high: doses.dose(i + 1),
      noRise: firstWithin(rule, rising ? target : 1 - target, gap),
      noFall: firstWithin(rule, rising ? 1 - target : target, gap),
    };
  });
}

/** First k ≥ 1 with a_k · pull ≤ gap/2; a_k falls with k. */
function firstWithin(rule: { c: number; k0: number; gamma: number }, pull: number, gap: number): number {
  const estimate = Math.ceil(((2 * pull * rule.c) / gap) ** (1 / rule.gamma) - rule.k0);
  let k = Math.max(1, estimate - 1);
  while (gainAt(rule, k) * pull > gap / 2) k += 1;
  return k;
}
