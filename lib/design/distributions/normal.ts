const SQRT_32 = 5.656854249492380195206754896838;
const ONE_OVER_SQRT_2PI = 0.398942280401432677939946059934;

// Rational approximations of W. J. Cody, "Rational Chebyshev approximation for the error function",
// Math. Comp. 23 (1969) 631-637, in the form of his Algorithm 715 (ACM TOMS 19, 1993, 22-32) for the normal cdf.
const CENTRE_NUMERATOR = [
  2.2352520354606839287, 161.02823106855587881, 1067.6894854603709582, 18154.981253343561249,
  0.065682337918207449113,
] as const;
const CENTRE_DENOMINATOR = [
  47.20258190468824187, 976.09855173777669322, 10260.932208618978205, 45507.789335026729956,
] as const;
const MIDDLE_NUMERATOR = [
  0.39894151208813466764, 8.8831497943883759412, 93.506656132177855979, 597.27027639480026226,
  2494.5375852903726711, 6848.1904505362823326, 11602.651437647350124, 9842.7148383839780218,
  1.0765576773720192317e-8,
] as const;
const MIDDLE_DENOMINATOR = [
  22.266688044328115691, 235.38790178262499861, 1519.377599407554805, 6485.558298266760755,
  18615.571640885098091, 34900.952721145977266, 38912.003286093271411, 19685.429676859990727,
] as const;
const TAIL_NUMERATOR = [
  0.21589853405795699, 0.1274011611602473639, 0.022235277870649807, 0.001421619193227893466,
  2.9112874951168792e-5, 0.02307344176494017303,
] as const;
const TAIL_DENOMINATOR = [
  1.28426009614491121, 0.468238212480865118, 0.0659881378689285515, 0.00378239633202758244,
  7.29751555083966205e-5,
] as const;

/** exp(-y²/2) with the square split, so that the rounding of y² is not magnified in the tail. */
function gaussianKernel(y: number): number {
  const coarse = Math.trunc(y * 16) / 16;
  const rest = (y - coarse) * (y + coarse);
  return Math.exp(-coarse * coarse * 0.5) * Math.exp(-rest * 0.5);
}

/** Upper tail P(Z > y) for y > 0.67448975. */
function upperTail(y: number): number {
  if (y <= SQRT_32) {
    let numerator = MIDDLE_NUMERATOR[8] * y;
    let denominator = y;
    for (let i = 0; i < 7; i++) {
      numerator = (numerator + (MIDDLE_NUMERATOR[i] as number)) * y;
      denominator = (denominator + (MIDDLE_DENOMINATOR[i] as number)) * y;
    }
    return (gaussianKernel(y) * (numerator + MIDDLE_NUMERATOR[7])) / (denominator + MIDDLE_DENOMINATOR[7]);
  }
  if (y > 38.6) return 0;
  const z = 1 / (y * y);
  let numerator = TAIL_NUMERATOR[5] * z;
  let denominator = z;
  for (let i = 0; i < 4; i++) {
    numerator = (numerator + (TAIL_NUMERATOR[i] as number)) * z;
    denominator = (denominator + (TAIL_DENOMINATOR[i] as number)) * z;
  }
  const ratio = (z * (numerator + TAIL_NUMERATOR[4])) / (denominator + TAIL_DENOMINATOR[4]);
  return (gaussianKernel(y) * (ONE_OVER_SQRT_2PI - ratio)) / y;
}

/**
 * Standard normal distribution function Φ(x) = P(Z ≤ x). Relative error about 1e-15, the lower tail included.
 *
 * @param x any number, infinite included; NaN gives NaN.
 * @returns a probability in [0, 1].
 * Source: W. J. Cody (1969, 1993), see the coefficients above.
 */
export function normalCdf(x: number): number {
  const y = Math.abs(x);
  if (y <= 0.67448975) {
    const square = y > 1.11e-16 ? x * x : 0;
    let numerator = CENTRE_NUMERATOR[4] * square;
    let denominator = square;
    for (let i = 0; i < 3; i++) {
      numerator = (numerator + (CENTRE_NUMERATOR[i] as number)) * square;
      denominator = (denominator + (CENTRE_DENOMINATOR[i] as number)) * square;
    }
    return 0.5 + (x * (numerator + CENTRE_NUMERATOR[3])) / (denominator + CENTRE_DENOMINATOR[3]);
  }
  if (Number.isNaN(x)) return NaN;
  return x > 0 ? 1 - upperTail(y) : upperTail(y);
}

/**
 * Standard normal density φ(x).
 *
 * @param x any number.
 * @returns exp(−x²/2)/√(2π), accurate in the tail.
 */
export function normalDensity(x: number): number {
  if (Number.isNaN(x)) return NaN;
  const y = Math.abs(x);
  return y > 40 ? 0 : ONE_OVER_SQRT_2PI * gaussianKernel(y);
}

/**
 * φ(x)/Φ(x), the derivative of ln Φ(x); finite for every finite x.
 *
 * @param x any number.
 * Source: below −30 the continued fraction t + 1/(t + 2/(t + 3/(t + …))), t = −x (DLMF 7.9.3).
 */
export function inverseMillsRatio(x: number): number {
  if (x >= -30) return normalDensity(x) / normalCdf(x);
  const t = -x;
  return t + 1 / (t + 2 / (t + 3 / (t + 4 / (t + 5 / t))));
}

/**
 * ln Φ(x), finite for every finite x.
 *
 * @param x any number.
 */
export function logNormalCdf(x: number): number {
  if (x > 5) return Math.log1p(-normalCdf(-x));
  if (x >= -30) return Math.log(normalCdf(x));
  return -0.5 * x * x + Math.log(ONE_OVER_SQRT_2PI) - Math.log(inverseMillsRatio(x));
}

/** Σ coefficients[i]·r^i by Horner's rule, the coefficients in ascending order. */
function polynomial(coefficients: readonly number[], r: number): number {
  let sum = 0;
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * r + (coefficients[i] as number);
  return sum;
}

// M. J. Wichura, Algorithm AS 241 (PPND16), Applied Statistics 37 (1988) 477-484.
const WICHURA_A = [
  3.387132872796366608, 133.14166789178437745, 1971.5909503065514427, 13731.693765509461125,
  45921.953931549871457, 67265.770927008700853, 33430.575583588128105, 2509.0809287301226727,
] as const;
const WICHURA_B = [
  1, 42.313330701600911252, 687.1870074920579083, 5394.1960214247511077, 21213.794301586595867,
  39307.89580009271061, 28729.085735721942674, 5226.495278852854561,
] as const;
const WICHURA_C = [
  1.42343711074968357734, 4.6303378461565452959, 5.7694972214606914055, 3.64784832476320460504,
  1.27045825245236838258, 0.24178072517745061177, 0.0227238449892691845833, 7.7454501427834140764e-4,
] as const;
const WICHURA_D = [
  1, 2.05319162663775882187, 1.6763848301838038494, 0.68976733498510000455, 0.14810397642748007459,
  0.0151986665636164571966, 5.475938084995344946e-4, 1.05075007164441684324e-9,
] as const;
const WICHURA_E = [
  6.6579046435011037772, 5.4637849111641143699, 1.7848265399172913358, 0.29656057182850489123,
  0.026532189526576123093, 0.0012426609473880784386, 2.71155556874348757815e-5, 2.01033439929228813265e-7,
] as const;
const WICHURA_F = [
  1, 0.59983220655588793769, 0.13692988092273580531, 0.0148753612908506148525, 7.868691311456132591e-4,
  1.8463183175100546818e-5, 1.4215117583164458887e-7, 2.04426310338993978564e-15,
] as const;

/**
 * Standard normal quantile Φ⁻¹(p). Relative error about 1e-16.
 *
 * @param p a probability; 0 and 1 give −∞ and ∞, anything outside [0, 1] gives NaN.
 * Source: Wichura (1988), Algorithm AS 241.
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return NaN;
  if (p === 0) return -Infinity;
  if (p === 1) return Infinity;
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * polynomial(WICHURA_A, r)) / polynomial(WICHURA_B, r);
  }
  const r = Math.sqrt(-Math.log(q < 0 ? p : 1 - p));
  const value =
    r <= 5
      ? polynomial(WICHURA_C, r - 1.6) / polynomial(WICHURA_D, r - 1.6)
      : polynomial(WICHURA_E, r - 5) / polynomial(WICHURA_F, r - 5);
  return q < 0 ? -value : value;
}
