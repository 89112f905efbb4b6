import { betaSurvival } from '../distributions/beta';

/** Guard of a strict comparison with a cutoff: a tie does not stop. */
export const CUTOFF_GUARD = 1e-12;

/**
 * Posterior probability that a response probability exceeds the target, P(p > Γ | Beta(a + y, b + n − y)).
 *
 * @param y responses. @param n evaluable subjects, ≥ y. @param target Γ in (0, 1).
 * @param priorA first parameter of the beta prior, > 0. @param priorB second parameter, > 0.
 */
export function exceedanceProbability(
  y: number,
  n: number,
  target: number,
  priorA: number,
  priorB: number,
): number {
  return betaSurvival(target, priorA + y, priorB + n - y);
}

/** True when the posterior probability is above the cutoff, ties within {@link CUTOFF_GUARD} not counted. */
export function exceedsCutoff(
  y: number,
  n: number,
  target: number,
  priorA: number,
  priorB: number,
  cutoff: number,
): boolean {
  return exceedanceProbability(y, n, target, priorA, priorB) > cutoff + CUTOFF_GUARD;
}

/**
 * The smallest number of responses among n at which the posterior probability is above the cutoff.
 *
 * @param n evaluable subjects, a whole number ≥ 0. Other parameters as in {@link exceedanceProbability}.
 * @returns null when even n responses do not reach it.
 */
export function closingBoundary(
  n: number,
  target: number,
  priorA: number,
  priorB: number,
  cutoff: number,
): number | null {
  for (let y = 0; y <= n; y++) if (exceedsCutoff(y, n, target, priorA, priorB, cutoff)) return y;
  return null;
}
