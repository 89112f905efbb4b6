/**
 * Log-odds ln(p/(1 − p)).
 *
 * @param p a probability; 0 and 1 give −∞ and ∞, anything outside [0, 1] gives NaN.
 */
export function logit(p: number): number {
  if (!(p >= 0 && p <= 1)) return NaN;
  return p < 0.5 ? Math.log(p) - Math.log1p(-p) : -(Math.log1p(-p) - Math.log(p));
}

/**
 * Logistic distribution function 1/(1 + exp(−η)), the inverse of {@link logit}; exact to rounding in both tails.
 *
 * @param eta any number.
 * @returns a probability in [0, 1].
 */
export function expit(eta: number): number {
  if (eta >= 0) return 1 / (1 + Math.exp(-eta));
  const odds = Math.exp(eta);
  return odds / (1 + odds);
}

/**
 * ln(1 + exp(η)) without overflow: minus the log probability of no response under a logit model.
 *
 * @param eta any number.
 */
export function logOnePlusExp(eta: number): number {
  return eta > 0 ? eta + Math.log1p(Math.exp(-eta)) : Math.log1p(Math.exp(eta));
}
