import { normalDensity, normalQuantile } from '../distributions/normal';
import { robbinsMonroAsymptotics } from '../estimate/asymptotics';
import type { RuleSettings } from '@/lib/schemas/design';

/** Gains c/(k + k0)^γ. */
export interface GainSequence {
  /** Working-scale units per unit of probability, > 0. */
  readonly c: number;
  readonly k0: number;
  /** In (1/2, 1]. */
  readonly gamma: number;
}

/** What a gain does for a believed slope D. */
export interface GainAssessment {
  /** D, probability per working-scale unit. */
  readonly slope: number;
  /** The best gain for this slope, 1/D. */
  readonly bestGain: number;
  /** ξ = cD. */
  readonly share: number;
  /** 2cD; for γ = 1 the rule converges at the rate √n only above 1. */
  readonly twoCD: number;
  /** Whether 2cD ≤ 1 with γ = 1: too small a gain, slower than √n. */
  readonly tooSmall: boolean;
  /** (2ξ − 1)/ξ² relative to the best gain; 0 when too small; null for γ < 1, where the last value has another rate. */
  readonly efficiency: number | null;
  /** Large-sample standard error of the last value after n cohorts, working scale; null when too small. */
  readonly asymptoticError: number | null;
  /** Root mean square error after n cohorts of the recursion made linear at the target, for any gain and k0. */
  readonly linearError: number;
  /** The least large-sample standard error of any gain after n cohorts, σ/(D√n). */
  readonly bestError: number;
}

/** a_k = c/(k + k0)^γ. */
export function gainAt({ c, k0, gamma }: GainSequence, k: number): number {
  return c / (gamma === 1 ? k + k0 : (k + k0) ** gamma);
}

/**
 * Root mean square error of x_{n+1} under x_{k+1} − θ = (1 − a_k D)(x_k − θ) − a_k ε_k, the Robbins–Monro recursion with the
 * curve replaced by its tangent at the target: finite n, any gain, also where no large-sample variance exists.
 *
 * @param gains the sequence. @param slope D > 0. @param outcomeVariance σ² = Γ(1 − Γ)/m. @param cohorts n ≥ 0.
 * @param startError |x_1 − θ| on the working scale, default 0.
 */
export function linearisedError(
  gains: GainSequence,
  slope: number,
  outcomeVariance: number,
  cohorts: number,
  startError = 0,
): number {
  let meanSquare = startError * startError;
  for (let k = 1; k <= cohorts; k++) {
    const a = gainAt(gains, k);
    const keep = 1 - a * slope;
    meanSquare = keep * keep * meanSquare + a * a * outcomeVariance;
  }
  return Math.sqrt(meanSquare);
}

/**
 * Assesses gains against a believed slope.
 *
 * @param gains c > 0, k0 ≥ 0, γ in (1/2, 1]. @param slope D = |M'(θ)| > 0, the slope of the curve, not of a logit or probit.
 * @param target Γ. @param cohortSize m ≥ 1. @param cohorts n ≥ 1. @param startError |x_1 − θ|, working scale, default 0.
 * Sources: Chung (1954), Sacks (1958); for γ < 1 Chung's n^(γ/2)(x_n − θ) → N(0, cσ²/(2D)). k0 does not change the
 * large-sample values.
 */
export function assessGain(
  gains: GainSequence,
  slope: number,
  target: number,
  cohortSize: number,
  cohorts: number,
  startError = 0,
): GainAssessment {
  const outcomeVariance = (target * (1 - target)) / cohortSize;
  const asymptotics = robbinsMonroAsymptotics(gains.c, slope, outcomeVariance);
  const bestError = Math.sqrt(asymptotics.optimalVariance / cohorts);
  const shared = {
    slope,
    bestGain: asymptotics.optimalGain,
    share: gains.c * slope,
    twoCD: asymptotics.twoCD,
    linearError: linearisedError(gains, slope, outcomeVariance, cohorts, startError),
    bestError,
  };
  if (gains.gamma < 1) {
    const asymptoticError = Math.sqrt((gains.c * outcomeVariance) / (2 * slope) / cohorts ** gains.gamma);
    return { ...shared, tooSmall: false, efficiency: null, asymptoticError };
  }
  const { valid, variance, efficiency } = asymptotics;
  const asymptoticError = variance === null ? null : Math.sqrt(variance / cohorts);
  return { ...shared, tooSmall: !valid, efficiency, asymptoticError };
}

/**
 * The gain sequence a rule comes to in the long run, for a believed slope D: c/(k + k0)^γ for Robbins–Monro (and for Kesten,
 * whose index lags behind), 1/(kb) for virtual observations, 1/(k b̂) with b̂ → D truncated for the adaptive slope,
 * 1/(k β_P φ(Φ⁻¹(Γ))) for Joseph's gains, the best gain 1/(kD) for the logit rule.
 */
export function longRunGain(rule: RuleSettings, slope: number, target: number): GainSequence {
  switch (rule.name) {
    case 'robbins-monro':
    case 'kesten':
      return { c: rule.c, k0: rule.k0, gamma: rule.gamma };
    case 'joseph':
      return { c: 1 / (rule.slope * normalDensity(normalQuantile(target))), k0: 0, gamma: 1 };
    case 'virtual-observations':
      return { c: 1 / rule.slope, k0: 0, gamma: 1 };
    case 'adaptive-slope':
      return { c: 1 / Math.min(rule.slopeHigh, Math.max(rule.slopeLow, slope)), k0: 0, gamma: 1 };
    case 'logit-ml':
      return { c: 1 / slope, k0: 0, gamma: 1 };
  }
}
