import { normalQuantile } from '../distributions/normal';
import { linkFunction, type Link } from './binary-regression';

/** Slopes at most this (along the direction of response) have no usable quantile. */
export const SMALLEST_SLOPE = 1e-8;

/** What a quantile is computed from: a fitted line link(P) = intercept + slope·x with its covariance. */
export interface FittedLine {
  readonly link: Link;
  readonly intercept: number;
  readonly slope: number;
  readonly covariance: readonly [readonly [number, number], readonly [number, number]];
}

/**
 * Fieller's confidence set. `bounded` is [lower, upper]; `complement-of-open-interval` is (−∞, lower] ∪ [upper, ∞);
 * `half-line` is [lower, ∞) or (−∞, upper], the other end infinite; `whole-line` excludes nothing. Only a bounded set counts
 * as an interval.
 */
export interface FiellerSet {
  readonly type: 'bounded' | 'complement-of-open-interval' | 'half-line' | 'whole-line';
  readonly lower: number;
  readonly upper: number;
}

/** The dose (working scale) at which a fitted curve has a given response probability. */
export interface QuantileEstimate {
  readonly estimate: number;
  readonly standardError: number;
  readonly delta: { readonly lower: number; readonly upper: number };
  readonly fieller: FiellerSet;
  /** z²Vββ/β²: Fieller's set is bounded exactly when it is below 1. */
  readonly fiellerG: number;
}

/**
 * Solves (α + βx − η)² ≤ z²(Vαα + 2xVαβ + x²Vββ) for x.
 *
 * @param line the fitted line. @param eta the linear predictor sought. @param z normal quantile of the level, > 0.
 * Source: Fieller (1954, JRSS B 16:175-185). Solved around the estimate, where no digits cancel.
 */
export function fiellerSet(line: FittedLine, eta: number, z: number): FiellerSet {
  const [[, covariance], [, varianceSlope]] = line.covariance;
  const centre = (eta - line.intercept) / line.slope;
  const square = z * z;
  const v0 = varianceAt(line, centre);
  const v1 = covariance + centre * varianceSlope;
  const a = line.slope * line.slope - square * varianceSlope;
  const discriminant = square * (square * v1 * v1 + a * v0);
  if (a === 0) {
    if (v1 === 0) return { type: 'whole-line', lower: -Infinity, upper: Infinity };
    const end = centre - v0 / (2 * v1);
    return v1 > 0
      ? { type: 'half-line', lower: end, upper: Infinity }
      : { type: 'half-line', lower: -Infinity, upper: end };
  }
  if (discriminant < 0) return { type: 'whole-line', lower: -Infinity, upper: Infinity };
  const root = Math.sqrt(discriminant);
  // Roots of a t² − 2z²v₁ t − z²v₀, the larger in size first, the other from their product.
  const sum = square * v1 + (v1 >= 0 ? root : -root);
  const far = sum / a;
  const near = sum === 0 ? 0 : (-square * v0) / sum;
  const lower = centre + Math.min(far, near);
  const upper = centre + Math.max(far, near);
  return { type: a > 0 ? 'bounded' : 'complement-of-open-interval', lower, upper };
}

function varianceAt(line: FittedLine, x: number): number {
  const [[intercept, covariance], [, slope]] = line.covariance;
  return Math.max(0, intercept + 2 * x * covariance + x * x * slope);
}

/**
 * The dose at which a fitted curve has response probability p, with its standard error by the delta method and both
 * intervals by normal quantiles.
 *
 * @param line the fitted line, on the working scale. @param p response probability in (0, 1).
 * @param level two-sided confidence level in (0, 1). @param direction 1 when response rises with x, −1 when it falls.
 * @returns null when the slope along the direction is at most {@link SMALLEST_SLOPE}.
 */
export function quantileEstimate(
  line: FittedLine,
  p: number,
  level: number,
  direction: 1 | -1 = 1,
): QuantileEstimate | null {
  if (!(direction * line.slope > SMALLEST_SLOPE)) return null;
  const eta = linkFunction(line.link, p);
  const z = normalQuantile(0.5 + level / 2);
  const estimate = (eta - line.intercept) / line.slope;
  const standardError = Math.sqrt(varianceAt(line, estimate)) / Math.abs(line.slope);
  return {
    estimate,
    standardError,
    delta: { lower: estimate - z * standardError, upper: estimate + z * standardError },
    fieller: fiellerSet(line, eta, z),
    fiellerG: (z * z * line.covariance[1][1]) / (line.slope * line.slope),
  };
}
