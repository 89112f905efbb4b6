import { betaCdf, betaSurvival } from './beta';
import { binomialKernel } from './binomial-kernel';

/**
 * Binomial probability P(Y = y), Y of n trials with response probability p.
 *
 * @param y a count; 0 outside 0 … n. @param n a number of trials. @param p a probability.
 */
export function binomialProbability(y: number, n: number, p: number): number {
  if (!(p >= 0 && p <= 1) || !(n >= 0)) return NaN;
  if (y < 0 || y > n || !Number.isInteger(y)) return 0;
  return binomialKernel(y, n - y, p, 1 - p);
}

/**
 * Binomial distribution function P(Y ≤ y).
 *
 * @param y any number (its integer part counts). @param n a number of trials. @param p a probability.
 * Source: the identity with the beta distribution, P(Y ≤ y) = 1 − I_p(y + 1, n − y) (DLMF 8.17.5).
 */
export function binomialCdf(y: number, n: number, p: number): number {
  if (!(p >= 0 && p <= 1) || !(n >= 0) || Number.isNaN(y)) return NaN;
  const count = Math.floor(y);
  if (count < 0) return 0;
  if (count >= n) return 1;
  return betaSurvival(p, count + 1, n - count);
}

/**
 * Upper tail P(Y > y) of a binomial count, accurate where it is small.
 *
 * @param y any number (its integer part counts). @param n a number of trials. @param p a probability.
 */
export function binomialSurvival(y: number, n: number, p: number): number {
  if (!(p >= 0 && p <= 1) || !(n >= 0) || Number.isNaN(y)) return NaN;
  const count = Math.floor(y);
  if (count < 0) return 1;
  if (count >= n) return 0;
  return betaCdf(p, count + 1, n - count);
}
