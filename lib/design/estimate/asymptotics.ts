/** Guard of the strict condition 2cD > 1. */
const STRICT = 1e-9;

/** Large-sample behaviour of the Robbins–Monro rule with gain c/k. */
export interface Asymptotics {
  /** 2cD: the rule converges at the rate √n only above 1. */
  readonly twoCD: number;
  readonly valid: boolean;
  /** Variance of √n(x_{n+1} − θ), n cohorts; null when not valid. */
  readonly variance: number | null;
  /** The least variance of any gain, σ²/D², reached at c = 1/D. */
  readonly optimalVariance: number;
  readonly optimalGain: number;
  /** optimalVariance / variance = (2ξ − 1)/ξ² with ξ = cD; 0 when not valid. */
  readonly efficiency: number;
}

/**
 * Asymptotic variance of the last iterate: √n(x_{n+1} − θ) → N(0, c²σ²/(2cD − 1)) when 2cD > 1.
 *
 * @param gain c > 0, working-scale units per unit of probability. @param slope D = |M'(θ)| > 0, the slope of the response
 * curve itself at the target dose. @param outcomeVariance σ² of a cohort's proportion at the target dose, Γ(1 − Γ)/m.
 * Sources: Chung (1954, Ann. Math. Statist. 25:463-483); Sacks (1958, 29:373-405).
 */
export function robbinsMonroAsymptotics(gain: number, slope: number, outcomeVariance: number): Asymptotics {
  const share = gain * slope;
  const twoCD = 2 * share;
  const valid = twoCD > 1 + STRICT;
  return {
    twoCD,
    valid,
    variance: valid ? (gain * gain * outcomeVariance) / (twoCD - 1) : null,
    optimalVariance: outcomeVariance / (slope * slope),
    optimalGain: 1 / slope,
    efficiency: valid ? (twoCD - 1) / (share * share) : 0,
  };
}

/** Slope D of a response curve where it has probability Γ, from the slope of its logit: |β_L| Γ(1 − Γ). */
export function curveSlopeFromLogit(logitSlope: number, target: number): number {
  return Math.abs(logitSlope) * target * (1 - target);
}
