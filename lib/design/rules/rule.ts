import type { RuleName, RuleSettings, SettingsOf } from '@/lib/schemas/design';
import type { TraceLine } from '../trace/line';
import { RULE, type TrialState } from '../trial-state';

/** How a step ended; anything but `done` becomes a typed failure with the state at which it arose. */
export const STEP = { done: 0, overflow: 1, notANumber: 2, notConverged: 3 } as const;
export type StepStatus = (typeof STEP)[keyof typeof STEP];

/** What a rule needs to know of the design besides its own settings. */
export interface StepContext<Settings> {
  readonly settings: Settings;
  /** Γ. */
  readonly target: number;
  /** s: +1 rising, −1 falling. A rule computes on s·x; only {@link enterStart} compares real doses. */
  readonly sign: 1 | -1;
}

/** What a rule is, for the pages that offer it. */
export interface RuleAbout {
  readonly title: string;
  /** Published source. */
  readonly source: string;
  /** One sentence on when it suits. */
  readonly suits: string;
}

/**
 * One rule of METHODS, step 1. A rule keeps its numbers in the registers of the trial's state (`RULE`), from
 * `RULE.OWN` on its own, and reads x̃, ȳ, m of all cohorts from there. `step` allocates nothing.
 */
export interface Rule<Name extends RuleName> {
  readonly name: Name;
  readonly about: RuleAbout;
  /** Whether x_{k+1} after steps 2, 3 and 7 is carried into the next step; otherwise the raw value is. */
  carriesProjected(settings: SettingsOf<Name>): boolean;
  /** Sets the registers for a trial whose next step is its first: x_1 (mirrored where falling), index 1. */
  initialise(settings: SettingsOf<Name>, x1: number, trial: TrialState): void;
  /** From the last cohort entered to the raw x_{k+1} in `RULE.NEXT`. */
  step(context: StepContext<SettingsOf<Name>>, trial: TrialState): StepStatus;
  /** The lines of the step just made, read from the registers. */
  explain(context: StepContext<SettingsOf<Name>>, trial: TrialState): TraceLine[];
  /** The rule's own numbers by name, as they stand; not finite where the step failed. */
  numbers(trial: TrialState): Record<string, number>;
}

/** A rule of any name, its settings matched to it by the registry. */
export interface AnyRule {
  readonly name: RuleName;
  readonly about: RuleAbout;
  carriesProjected(settings: RuleSettings): boolean;
  initialise(settings: RuleSettings, x1: number, trial: TrialState): void;
  step(context: StepContext<RuleSettings>, trial: TrialState): StepStatus;
  explain(context: StepContext<RuleSettings>, trial: TrialState): TraceLine[];
  numbers(trial: TrialState): Record<string, number>;
}

/**
 * Puts f_k, the value a step starts from, into `RULE.FROM`: x_k (`iterate`) or x̃_k (`given`). Where the signed dose was below
 * the recommended one, `iterate` starts from the lower of the two, as real doses for both signs.
 */
export function enterStart(carry: 'iterate' | 'given', sign: 1 | -1, trial: TrialState): void {
  const given = trial.given[trial.steps - 1] as number;
  const x = trial.rule[RULE.X] as number;
  let from = carry === 'given' ? given : x;
  if (carry === 'iterate' && trial.lowered) from = sign > 0 ? Math.min(x, given) : Math.max(x, given);
  trial.rule[RULE.FROM] = from;
}

/** The status of the raw value in `RULE.NEXT`: overflow and NaN are never carried on. */
export function statusOfNext(trial: TrialState): StepStatus {
  const next = trial.rule[RULE.NEXT] as number;
  if (Number.isFinite(next)) return STEP.done;
  return Number.isNaN(next) ? STEP.notANumber : STEP.overflow;
}
