import type { FinalEstimator } from '@/lib/schemas/design';
import type { BinaryFit } from './fit';
import type { DoseRow } from './rows';

/** What is known at the end of a trial, or at any step of it. All doses are real ones on the working scale, never mirrored. */
export interface EstimationData {
  /** Evaluable subjects by dose really given. */
  readonly rows: readonly DoseRow[];
  /** m_k of every cohort with an evaluable subject. */
  readonly cohortSizes: ArrayLike<number>;
  /** x_1 … x_{K+1}, the rule's values after the largest rise and the projection. */
  readonly iterates: ArrayLike<number>;
  /** τ_{K+1} where the rule is Joseph's. */
  readonly priorSd?: number | null;
}

/** Why there is no estimate. */
export type NoEstimateReason =
  | 'no-data'
  | 'all-nonresponse'
  | 'all-response'
  | 'single-dose'
  | 'separated-increasing'
  | 'separated-decreasing'
  | 'quasi-separated-increasing'
  | 'quasi-separated-decreasing'
  | 'no-slope'
  | 'not-converged'
  | 'burn-in';

/** Why there is no interval although there is an estimate. */
export type NoIntervalReason =
  | 'estimator-has-none'
  | 'rule-has-none'
  | 'levels'
  | 'gain-exponent'
  | 'carries-given'
  | 'no-cohort'
  | 'slope-unknown'
  | 'gain-too-small'
  | 'all-or-none';

/** What a reader must know about an estimate. */
export type EstimateFlag =
  | 'beyond-lowest-dose'
  | 'beyond-highest-dose'
  | 'flat'
  | 'extrapolated'
  | 'averaging-with-gain-exponent-one'
  | 'model-based-interval'
  | 'interval-not-bounded';

/** A confidence set for the target dose, on the working scale and in dose units. */
export interface TargetInterval {
  readonly method: 'sacks' | 'model-based' | 'bootstrap' | 'delta' | 'fieller';
  readonly level: number;
  /**
   * `bounded`: [lower, upper]. `partly-bounded`: a bootstrap interval with an end (null) that is not bounded.
   * `complement-of-open-interval`: all but (lower, upper). `half-line`: one end infinite. `whole-line`: excludes nothing.
   * Only a bounded set counts as an interval.
   */
  readonly type: 'bounded' | 'partly-bounded' | 'complement-of-open-interval' | 'half-line' | 'whole-line';
  readonly lower: number | null;
  readonly upper: number | null;
  readonly lowerDose: number | null;
  readonly upperDose: number | null;
}

/** How a bootstrap interval was made. */
export interface BootstrapRecord {
  readonly draws: number;
  readonly seed: number;
  /** Shares of draws that never reach the target within the doses given, and were kept at the lowest or highest dose. */
  readonly shareAtLowest: number;
  readonly shareAtHighest: number;
}

/** The estimated target dose with its interval, or typed reasons why one or the other is missing. */
export interface TargetEstimate {
  readonly estimator: FinalEstimator['name'];
  /** On the working scale. */
  readonly x: number | null;
  /** In the trial's unit. */
  readonly dose: number | null;
  readonly reason: NoEstimateReason | null;
  /** On the working scale, where the estimator has one. */
  readonly standardError: number | null;
  readonly interval: TargetInterval | null;
  readonly intervalReason: NoIntervalReason | NoEstimateReason | null;
  readonly flags: readonly EstimateFlag[];
  readonly bootstrap: BootstrapRecord | null;
  /** The fitted curve behind a logit or probit estimate. */
  readonly fit: BinaryFit | null;
  /** Polyak–Ruppert: the mean without the next value, on the working scale. */
  readonly assignedMean: number | null;
}

/** Sentences for the reasons and flags, for pages, letters and reports. */
export const estimateReasonTexts: Record<NoEstimateReason | NoIntervalReason | EstimateFlag, string> = {
  'no-data': 'No evaluable subject yet.',
  'all-nonresponse': 'Nobody responded, so no curve can be fitted.',
  'all-response': 'Everybody responded, so no curve can be fitted.',
  'single-dose': 'Only one dose was given, so no curve can be fitted.',
  'separated-increasing':
    'All responses lie above all non-responses, so the fitted slope has no finite value.',
  'separated-decreasing':
    'All responses lie below all non-responses, so the fitted slope has no finite value.',
  'quasi-separated-increasing':
    'Responses and non-responses overlap at one dose only, so the fitted slope has no finite value.',
  'quasi-separated-decreasing':
    'Responses and non-responses overlap at one dose only, so the fitted slope has no finite value.',
  'no-slope': 'The fitted curve does not run in the direction the design says, so it has no target dose.',
  'not-converged': 'The fit did not settle.',
  'burn-in': 'The burn-in leaves no value to average.',
  'estimator-has-none': 'This estimator comes without an interval.',
  'rule-has-none': 'The last value of this rule comes without an interval.',
  levels: 'The asymptotic interval holds for doses on a range only, not on levels.',
  'gain-exponent': 'The asymptotic interval holds for the gain exponent 1 only.',
  'carries-given': 'The asymptotic interval does not hold where the rule carries on from the dose given.',
  'no-cohort': 'No cohort has been completed.',
  'slope-unknown': 'The slope of the response curve cannot be estimated yet, so neither can the precision.',
  'gain-too-small':
    'Twice the gain times the estimated slope is not above 1, so the rule converges too slowly for an interval.',
  'all-or-none': 'Every fitted proportion is 0 or 1, so resampling shows no variation.',
  'beyond-lowest-dose': 'The target lies beyond the lowest dose given; that dose is shown.',
  'beyond-highest-dose': 'The target lies beyond the highest dose given; that dose is shown.',
  flat: 'The curve equals the target over a stretch of doses; its midpoint is shown.',
  extrapolated: 'The estimate lies outside the doses given.',
  'averaging-with-gain-exponent-one': 'Averaging is efficient only for gain exponents below 1.',
  'model-based-interval': 'The interval is model-based: it rests on the prior and slope the rule was given.',
  'interval-not-bounded': 'The confidence set is not a bounded interval and counts as none.',
};
