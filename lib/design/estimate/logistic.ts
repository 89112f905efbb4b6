import { BinaryRegression, type FitMethod } from './binary-regression';
import { fitBinary, type FitResult } from './fit';
import type { DoseRow } from './rows';

/**
 * Fits logit P(response) = α + β_L x, by maximum likelihood (Wu 1985) or Firth's penalised likelihood (1993).
 *
 * @param rows doses on the working scale with evaluable subjects and responses. @param method default maximum likelihood.
 * @throws RangeError for rows outside 0 ≤ y ≤ n.
 */
export function fitLogistic(rows: readonly DoseRow[], method: FitMethod = 'maximum-likelihood'): FitResult {
  return fitBinary('logit', rows, method);
}

/** A logit fit whose buffers are kept, for callers that fit many times: see {@link BinaryRegression}. */
export function logisticRegression(capacity: number): BinaryRegression {
  return new BinaryRegression('logit', capacity);
}
