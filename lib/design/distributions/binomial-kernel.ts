import { devianceTerm, stirlingError } from './log-gamma';

const LN_2PI = 1.837877066409345483560659472811;

/**
 * Γ(k+l+1)/(Γ(k+1)Γ(l+1)) pᵏ qˡ with q = 1 − p given apart, so that neither tail loses digits. For whole k and l it is the
 * binomial probability of k responses and l non-responses; they need not be whole, which makes it the kernel of the beta
 * density too.
 *
 * @param k a number ≥ 0. @param l a number ≥ 0. @param p a probability. @param q 1 − p.
 * Source: C. Loader, "Fast and accurate computation of binomial probabilities" (2000), saddle-point expansion.
 */
export function binomialKernel(k: number, l: number, p: number, q: number): number {
  if (p === 0) return k === 0 ? 1 : 0;
  if (q === 0) return l === 0 ? 1 : 0;
  if (k === 0) return l === 0 ? 1 : Math.exp(p < 0.1 ? l * Math.log1p(-p) : l * Math.log(q));
  if (l === 0) return Math.exp(q < 0.1 ? k * Math.log1p(-q) : k * Math.log(p));
  const n = k + l;
  const exponent =
    stirlingError(n) - stirlingError(k) - stirlingError(l) - devianceTerm(k, n * p) - devianceTerm(l, n * q);
  return Math.exp(exponent - 0.5 * (LN_2PI + Math.log(k) + Math.log(l) - Math.log(n)));
}
