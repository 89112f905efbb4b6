const HALF_LN_2PI = 0.918938533204672741780329736406;

/**
 * δ(z) in Stirling's series ln Γ(z) = (z − ½) ln z − z + ½ ln 2π + δ(z), for z ≥ 10.
 * The Bernoulli-number coefficients are those of NIST's Digital Library of Mathematical Functions, 5.11.1.
 */
function stirlingSeries(z: number): number {
  const inverse = 1 / z;
  const square = inverse * inverse;
  return (
    inverse *
    (1 / 12 -
      square *
        (1 / 360 -
          square *
            (1 / 1260 -
              square *
                (1 / 1680 -
                  square *
                    (1 / 1188 - square * (691 / 360360 - square * (1 / 156 - (square * 3617) / 122400)))))))
  );
}

/**
 * Natural logarithm of the gamma function.
 *
 * @param z a positive number; ∞ gives ∞; zero, a negative number or NaN gives NaN.
 * Source: Stirling's series (DLMF 5.11.1) after shifting z to 10 or above by Γ(z + 1) = zΓ(z).
 */
export function logGamma(z: number): number {
  if (!(z > 0)) return NaN;
  if (z === Infinity) return Infinity;
  let shifted = z;
  let product = 1;
  while (shifted < 10) {
    product *= shifted;
    shifted += 1;
  }
  return (
    (shifted - 0.5) * Math.log(shifted) - shifted + HALF_LN_2PI + stirlingSeries(shifted) - Math.log(product)
  );
}

/**
 * Error of Stirling's formula ln Γ(n + 1) − [(n + ½) ln n − n + ½ ln 2π], which binomial and beta densities need without
 * the cancellation of large log-gammas.
 *
 * @param n a positive number (not only an integer).
 * Source: C. Loader, "Fast and accurate computation of binomial probabilities" (2000).
 */
export function stirlingError(n: number): number {
  if (n >= 10) return stirlingSeries(n);
  return logGamma(n + 1) - ((n + 0.5) * Math.log(n) - n + HALF_LN_2PI);
}

/**
 * Deviance part x ln(x/m) + m − x of a Poisson or binomial probability, without cancellation where x is near m.
 *
 * @param x a non-negative number. @param m a positive number.
 * Source: Loader (2000), function bd0.
 */
export function devianceTerm(x: number, m: number): number {
  if (x === 0) return m;
  if (Math.abs(x - m) < 0.1 * (x + m)) {
    const v = (x - m) / (x + m);
    let sum = (x - m) * v;
    let term = 2 * x * v;
    for (let j = 1; j < 1000; j++) {
      term *= v * v;
      const next = sum + term / (2 * j + 1);
      if (next === sum) return next;
      sum = next;
    }
  }
  return x * Math.log(x / m) + m - x;
}
