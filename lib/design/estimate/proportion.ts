import { betaQuantile } from '../distributions/beta';
import { normalQuantile } from '../distributions/normal';

export const proportionMethods = ['wilson', 'clopper-pearson', 'jeffreys'] as const;
export type ProportionMethod = (typeof proportionMethods)[number];

/** A confidence interval for a response probability. */
export interface ProportionInterval {
  readonly lower: number;
  readonly upper: number;
}

function refuse(y: number, n: number, level: number): void {
  if (!Number.isInteger(y) || !Number.isInteger(n) || n < 1 || y < 0 || y > n) {
    throw new RangeError(`An interval needs whole 0 <= y <= n with n >= 1, got y=${y}, n=${n}.`);
  }
  if (!(level > 0 && level < 1))
    throw new RangeError(`A confidence level lies between 0 and 1, got ${level}.`);
}

/** Wilson's score interval (1927) without continuity correction; exactly 0 at y = 0 and 1 at y = n. */
export function wilsonInterval(y: number, n: number, level: number): ProportionInterval {
  refuse(y, n, level);
  const z = normalQuantile(0.5 + level / 2);
  const square = z * z;
  const centre = y + square / 2;
  const half = z * Math.sqrt((y * (n - y)) / n + square / 4);
  return {
    lower: y === 0 ? 0 : (centre - half) / (n + square),
    upper: y === n ? 1 : (centre + half) / (n + square),
  };
}

/** Clopper & Pearson's interval (1934), by beta quantiles. */
export function clopperPearsonInterval(y: number, n: number, level: number): ProportionInterval {
  refuse(y, n, level);
  const tail = (1 - level) / 2;
  return {
    lower: y === 0 ? 0 : betaQuantile(tail, y, n - y + 1),
    upper: y === n ? 1 : 1 - betaQuantile(tail, n - y, y + 1),
  };
}

/**
 * Jeffreys' equal-tailed interval from Beta(y + ½, n − y + ½), with end 0 at y = 0 and 1 at y = n (Brown, Cai & DasGupta
 * 2001, Statist. Sci. 16:101-133).
 */
export function jeffreysInterval(y: number, n: number, level: number): ProportionInterval {
  refuse(y, n, level);
  const tail = (1 - level) / 2;
  return {
    lower: y === 0 ? 0 : betaQuantile(tail, y + 0.5, n - y + 0.5),
    upper: y === n ? 1 : 1 - betaQuantile(tail, n - y + 0.5, y + 0.5),
  };
}

/**
 * Two-sided interval for a response probability. Raw proportions by dose are biased by adaptive allocation, up above the
 * target dose and down below it (Flournoy & Oron 2020): say so wherever one is shown.
 *
 * @param y responses. @param n evaluable subjects, ≥ 1. @param level coverage in (0, 1). @param method default Wilson's.
 * @throws RangeError for counts or a level outside their range.
 */
export function proportionInterval(
  y: number,
  n: number,
  level = 0.95,
  method: ProportionMethod = 'wilson',
): ProportionInterval {
  if (method === 'wilson') return wilsonInterval(y, n, level);
  return method === 'clopper-pearson' ? clopperPearsonInterval(y, n, level) : jeffreysInterval(y, n, level);
}
