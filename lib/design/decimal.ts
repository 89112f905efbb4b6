import Big from 'big.js';

/**
 * Exact decimal arithmetic on doses. A dose is carried as its canonical decimal text (see
 * `lib/schemas/dose.ts`), so that 0.1 mg + 0.2 mg is 0.3 mg on every page and in storage.
 * Every function takes canonical decimals; big.js throws on a text that is no decimal.
 */
export type Decimal = string;

/** Canonical text of a decimal: no exponent, no leading or trailing zeros ("0.30" becomes "0.3"). */
export function canonicalDecimal(text: string): Decimal {
  return new Big(text).toFixed();
}

/** -1, 0 or 1 as a is below, equal to or above b; exact. */
export function compareDecimals(a: Decimal, b: Decimal): -1 | 0 | 1 {
  if (a === b) return 0;
  const x = Number(a);
  const y = Number(b);
  if (x < y) return -1;
  if (x > y) return 1;
  return new Big(a).cmp(b);
}

/** True when both texts are the same number ("1.0" equals "1"). */
export function equalDecimals(a: Decimal, b: Decimal): boolean {
  return compareDecimals(a, b) === 0;
}

/** a + b, exact, canonical. */
export function addDecimals(a: Decimal, b: Decimal): Decimal {
  return new Big(a).plus(b).toFixed();
}

/** a − b, exact, canonical (may be negative). */
export function subtractDecimals(a: Decimal, b: Decimal): Decimal {
  return new Big(a).minus(b).toFixed();
}

/** a × n for an integer n, exact, canonical. Throws a RangeError when n is no safe integer. */
export function multiplyDecimal(a: Decimal, n: number): Decimal {
  if (!Number.isSafeInteger(n)) throw new RangeError(`${n} is not an integer.`);
  return new Big(a).times(n).toFixed();
}

/** The double nearest to the decimal (correctly rounded, so monotone). */
export function decimalToNumber(a: Decimal): number {
  return Number(a);
}

/** Number of digits after the decimal point of a canonical decimal. */
export function decimalPlaces(a: Decimal): number {
  const point = a.indexOf('.');
  return point < 0 ? 0 : a.length - point - 1;
}

/** The decimal with at least `places` digits after the point, for columns aligned on it ("5" → "5.0"). */
export function formatDecimal(a: Decimal, places = 0): string {
  const have = decimalPlaces(a);
  if (have >= places) return a;
  return (have === 0 ? `${a}.` : a) + '0'.repeat(places - have);
}

/**
 * A power-of-ten reading of a decimal: mantissa and exponent with 1 ≤ mantissa < 10, as canonical texts
 * ("25000" → { mantissa: "2.5", exponent: 4 }). Zero has none.
 */
export function powerOfTen(a: Decimal): { mantissa: Decimal; exponent: number } | null {
  const big = new Big(a);
  if (big.eq(0)) return null;
  const mantissa = new Big(big);
  mantissa.e = 0;
  return { mantissa: mantissa.toFixed(), exponent: big.e };
}
