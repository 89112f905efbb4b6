import { gaussLegendreRule } from './gauss-legendre';
import { normalCdf } from './normal';

const rule = gaussLegendreRule(24);

/** T(h, a) for h ≥ 0 and 0 ≤ a ≤ 1, in panels short against the width 1/h of the integrand. */
function bySmoothQuadrature(h: number, a: number): number {
  const end = h > 9 / a ? 9 / h : a;
  const panels = Math.max(1, Math.ceil((h * end) / 4));
  const width = end / panels;
  let sum = 0;
  for (let panel = 0; panel < panels; panel++) {
    const middle = (panel + 0.5) * width;
    for (let i = 0; i < rule.nodes.length; i++) {
      const x = middle + 0.5 * width * (rule.nodes[i] as number);
      const factor = 1 + x * x;
      sum += ((rule.weights[i] as number) * Math.exp(-0.5 * h * h * factor)) / factor;
    }
  }
  return (sum * width) / (4 * Math.PI);
}

/**
 * Owen's function T(h, a) = (2π)⁻¹ ∫₀ᵃ exp(−h²(1 + x²)/2)/(1 + x²) dx.
 *
 * @param h any number (T is even in h). @param a any number (T is odd in a), infinite included.
 * Source: D. B. Owen, Ann. Math. Statist. 27 (1956) 1075-1090; for |a| > 1 his reflection
 * T(h, a) = ½[Q(h) + Q(ah)] − Q(h)Q(ah) − T(ah, 1/a), h ≥ 0, with Q the normal upper tail.
 */
export function owensT(h: number, a: number): number {
  if (Number.isNaN(h) || Number.isNaN(a)) return NaN;
  const height = Math.abs(h);
  const slope = Math.abs(a);
  const sign = a < 0 ? -1 : 1;
  if (slope === 0) return 0;
  if (height === 0) return (sign * Math.atan(slope)) / (2 * Math.PI);
  if (slope <= 1) return sign * bySmoothQuadrature(height, slope);
  const tail = normalCdf(-height);
  if (slope === Infinity) return (sign * tail) / 2;
  const product = height * slope;
  const otherTail = normalCdf(-product);
  return sign * (0.5 * (tail + otherTail) - tail * otherTail - bySmoothQuadrature(product, 1 / slope));
}

/**
 * P(U₁ ≤ h, U₂ ≤ h) for standard normals with correlation ρ: Φ(h) − 2T(h, √((1 − ρ)/(1 + ρ))).
 *
 * @param h any number. @param rho correlation in (−1, 1].
 * Source: Owen (1956).
 */
export function bivariateNormalEqual(h: number, rho: number): number {
  return normalCdf(h) - 2 * owensT(h, Math.sqrt((1 - rho) / (1 + rho)));
}
