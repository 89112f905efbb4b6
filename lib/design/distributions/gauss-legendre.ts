/** Nodes in (−1, 1) and weights of a Gauss–Legendre rule. */
export interface QuadratureRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

/**
 * Gauss–Legendre rule on [−1, 1], exact for polynomials up to degree 2n − 1.
 *
 * @param n number of nodes, an integer ≥ 1.
 * Source: Newton's method on the three-term recurrence of the Legendre polynomials (DLMF 3.5(v), 18.9.1).
 */
export function gaussLegendreRule(n: number): QuadratureRule {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let derivative = 1;
    for (let step = 0; step < 100; step++) {
      let previous = 1;
      let current = x;
      for (let k = 2; k <= n; k++) {
        const next = ((2 * k - 1) * x * current - (k - 1) * previous) / k;
        previous = current;
        current = next;
      }
      derivative = (n * (x * current - previous)) / (x * x - 1);
      const move = current / derivative;
      x -= move;
      if (Math.abs(move) < 1e-16) break;
    }
    nodes[i] = x;
    weights[i] = 2 / ((1 - x * x) * derivative * derivative);
  }
  return { nodes, weights };
}

/**
 * ∫ f over [low, high] by one Gauss–Legendre rule.
 *
 * @param f a smooth function. @param low lower end. @param high upper end. @param rule from {@link gaussLegendreRule}.
 */
export function integrate(f: (x: number) => number, low: number, high: number, rule: QuadratureRule): number {
  const half = (high - low) / 2;
  const middle = (high + low) / 2;
  let sum = 0;
  for (let i = 0; i < rule.nodes.length; i++) {
    sum += (rule.weights[i] as number) * f(middle + half * (rule.nodes[i] as number));
  }
  return sum * half;
}
