import { BinaryRegression, type FitMethod } from './binary-regression';
import { fitBinary, type FitResult } from './fit';
import type { DoseRow } from './rows';

/**
 * Fits Φ⁻¹ P(response) = α + β_P x, by maximum likelihood or Firth's penalised likelihood (the penalty with the probit's
 * expected information).
 *
 * @param rows doses on the working scale with evaluable subjects and responses. @param method default maximum likelihood.
 * @throws RangeError for rows outside 0 ≤ y ≤ n.
 */
export function fitProbit(rows: readonly DoseRow[], method: FitMethod = 'maximum-likelihood'): FitResult {
  return fitBinary('probit', rows, method);
}

/** A probit fit whose buffers are kept, for callers that fit many times: see {@link BinaryRegression}. */
export function probitRegression(capacity: number): BinaryRegression {
  return new BinaryRegression('probit', capacity);
}
