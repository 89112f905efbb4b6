/** Means of a rule's values after a burn-in; null where no value is left. */
export interface AveragedIterates {
  /** Mean of x_{B+1} … x_{K+1}, the next value included. */
  readonly withNext: number | null;
  /** Mean of x_{B+1} … x_K, the values of cohorts treated. */
  readonly assigned: number | null;
}

/** Mean of x[from] … x[to − 1]; null when there is none. */
function mean(x: ArrayLike<number>, from: number, to: number): number | null {
  if (to <= from) return null;
  let sum = 0;
  for (let i = from; i < to; i++) sum += x[i] as number;
  return sum / (to - from);
}

/**
 * Polyak–Ruppert averages on the working scale, so on the log scale their dose is a geometric mean. Efficient only for gain
 * exponents γ < 1.
 *
 * @param iterates x_1 … x_{K+1}, as assigned (after the largest rise and the projection). @param burnIn B ≥ 0 leading values
 * left out.
 * Source: Ruppert (1988); Polyak & Juditsky (1992, SIAM J. Control Optim. 30:838-855).
 */
export function averagedIterates(iterates: ArrayLike<number>, burnIn: number): AveragedIterates {
  return {
    withNext: mean(iterates, burnIn, iterates.length),
    assigned: mean(iterates, burnIn, iterates.length - 1),
  };
}
