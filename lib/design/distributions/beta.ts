import { binomialKernel } from './binomial-kernel';
import { logGamma } from './log-gamma';

/**
 * Continued fraction of the incomplete beta function (DLMF 8.17.22), by Lentz's method as modified by Thompson & Barnett
 * (J. Comput. Phys. 64, 1986, 490-509). Needs x below (a + 1)/(a + b + 2), where it converges fast.
 */
function continuedFraction(x: number, a: number, b: number): number {
  const tiny = 1e-300;
  let c = 1;
  let d = 1 - ((a + b) * x) / (a + 1);
  d = 1 / (Math.abs(d) < tiny ? tiny : d);
  let value = d;
  for (let m = 1; m <= 20000; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 + even * d;
    d = 1 / (Math.abs(d) < tiny ? tiny : d);
    c = 1 + even / c;
    if (Math.abs(c) < tiny) c = tiny;
    value *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 + odd * d;
    d = 1 / (Math.abs(d) < tiny ? tiny : d);
    c = 1 + odd / c;
    if (Math.abs(c) < tiny) c = tiny;
    const factor = d * c;
    value *= factor;
    if (Math.abs(factor - 1) < 2e-16) return value;
  }
  return NaN;
}

/** I_x(a, b) with y = 1 − x given apart. */
function regularizedIncompleteBeta(x: number, y: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (y <= 0) return 1;
  const scale = a + b;
  const kernel = (binomialKernel(a, b, x, y) * a * b) / scale;
  if (x <= (a + 1) / (scale + 2)) return Math.min(1, (kernel / a) * continuedFraction(x, a, b));
  return Math.max(0, 1 - (kernel / b) * continuedFraction(y, b, a));
}

function badArguments(x: number, a: number, b: number): boolean {
  return Number.isNaN(x) || !(a > 0) || !(b > 0) || a === Infinity || b === Infinity;
}

/**
 * Beta distribution function I_x(a, b) = P(P ≤ x) for P ~ Beta(a, b); relative error below about 1e-13.
 *
 * @param x any number; at most 0 gives 0, at least 1 gives 1. @param a first shape, > 0. @param b second shape, > 0.
 * @returns a probability; NaN for shapes that are not positive and finite.
 */
export function betaCdf(x: number, a: number, b: number): number {
  return badArguments(x, a, b) ? NaN : regularizedIncompleteBeta(x, 1 - x, a, b);
}

/**
 * Upper tail 1 − I_x(a, b) = P(P > x), accurate where it is small.
 *
 * @param x any number. @param a first shape, > 0. @param b second shape, > 0.
 * @returns a probability; NaN for shapes that are not positive and finite.
 */
export function betaSurvival(x: number, a: number, b: number): number {
  return badArguments(x, a, b) ? NaN : regularizedIncompleteBeta(1 - x, x, b, a);
}

/**
 * Beta density x^(a−1)(1−x)^(b−1)/B(a, b).
 *
 * @param x a number; 0 outside [0, 1]. @param a first shape, > 0. @param b second shape, > 0.
 */
export function betaDensity(x: number, a: number, b: number): number {
  if (badArguments(x, a, b)) return NaN;
  if (x < 0 || x > 1) return 0;
  if (x === 0) return a < 1 ? Infinity : a === 1 ? b : 0;
  if (x === 1) return b < 1 ? Infinity : b === 1 ? a : 0;
  return (binomialKernel(a, b, x, 1 - x) * a * b) / ((a + b) * x * (1 - x));
}

/**
 * Solves I_x(a, b) = p for a root x ≤ ½ by Newton's method on ln I against ln x, nearly a line in the tail, inside a bracket
 * that shrinks with every evaluation. It starts at the bound I_x(a, b) ≤ xᵃ max(1, 2^(1−b))/(a B(a, b)), x ≤ ½; from there
 * Newton's method rises monotonically where b ≥ 1, ln I then being concave in ln x.
 */
function lowerQuantile(p: number, a: number, b: number): number {
  const target = Math.log(p);
  const logBeta = logGamma(a) + logGamma(b) - logGamma(a + b);
  let high = Math.log(0.5);
  let low = (target + Math.log(a) + logBeta - Math.max(0, 1 - b) * Math.LN2) / a;
  low = Math.min(low - 1e-9 * (1 + Math.abs(low)), high);
  if (low < -744) return Math.exp(low);
  let u = low;
  for (let i = 0; i < 200; i++) {
    const x = Math.exp(u);
    const cdf = regularizedIncompleteBeta(x, 1 - x, a, b);
    const error = Math.log(cdf) - target;
    if (error === 0) return x;
    if (error < 0) low = u;
    else high = u;
    const slope = (binomialKernel(a, b, x, 1 - x) * a * b) / ((a + b) * (1 - x) * cdf);
    let next = u - error / slope;
    if (!(next >= low && next <= high)) next = (low + high) / 2;
    if (Math.abs(next - u) <= 3e-16 * (1 + Math.abs(u))) return Math.exp(next);
    u = next;
  }
  return Math.exp(u);
}

/**
 * Beta quantile: the x with I_x(a, b) = p.
 *
 * @param p a probability; 0 and 1 give 0 and 1. @param a first shape, > 0. @param b second shape, > 0.
 * @returns a number in [0, 1]; NaN for arguments outside their range.
 */
export function betaQuantile(p: number, a: number, b: number): number {
  if (badArguments(p, a, b) || p < 0 || p > 1) return NaN;
  if (p === 0) return 0;
  if (p === 1) return 1;
  const atHalf = regularizedIncompleteBeta(0.5, 0.5, a, b);
  if (p <= atHalf) return lowerQuantile(p, a, b);
  return 1 - lowerQuantile(1 - p, b, a);
}
