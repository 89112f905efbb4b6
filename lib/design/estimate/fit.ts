import { BinaryRegression, type FitMethod, type Link } from './binary-regression';
import type { ExistenceStatus } from './existence';
import type { DoseRow } from './rows';

/** A fitted curve link(P) = intercept + slope·x with the inverse expected information as its covariance. */
export interface BinaryFit {
  readonly link: Link;
  readonly method: FitMethod;
  readonly intercept: number;
  /** Slope of the linear predictor per unit of x: β_L or β_P, never the slope D of the response curve. */
  readonly slope: number;
  /** Covariance of (intercept, slope), rows. */
  readonly covariance: readonly [readonly [number, number], readonly [number, number]];
  /** Log-likelihood kernel without binomial coefficients; penalised for Firth's method. */
  readonly logLikelihood: number;
  readonly iterations: number;
}

export type FitResult =
  | { readonly outcome: 'fitted'; readonly status: ExistenceStatus; readonly fit: BinaryFit }
  | { readonly outcome: 'no-maximum'; readonly status: ExistenceStatus }
  | {
      readonly outcome: 'not-converged';
      readonly status: ExistenceStatus;
      /** The state at which Newton's method was left. */
      readonly intercept: number;
      readonly slope: number;
      readonly iterations: number;
    };

/**
 * Fits a two-parameter curve to grouped data.
 *
 * @param link logit or probit. @param rows doses on the working scale with evaluable subjects and responses.
 * @param method maximum likelihood, or Firth's penalised likelihood, which is finite unless all doses are equal.
 * @returns the fit; or why there is none (`status`); or where the iteration was left.
 * @throws RangeError for rows outside 0 ≤ y ≤ n.
 */
export function fitBinary(link: Link, rows: readonly DoseRow[], method: FitMethod): FitResult {
  const regression = new BinaryRegression(link, rows.length);
  for (const row of rows) regression.add(row.x, row.n, row.y);
  const outcome = regression.fit(method);
  const { status, intercept, slope, iterations } = regression;
  if (outcome === 'no-maximum') return { outcome, status };
  if (outcome === 'not-converged') return { outcome, status, intercept, slope, iterations };
  return {
    outcome,
    status,
    fit: {
      link,
      method,
      intercept,
      slope,
      covariance: [
        [regression.varianceIntercept, regression.covariance],
        [regression.covariance, regression.varianceSlope],
      ],
      logLikelihood: regression.logLikelihood,
      iterations,
    },
  };
}
