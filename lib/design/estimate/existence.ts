/**
 * Whether the likelihood of a two-parameter logit or probit model has a finite maximum, and if not, why. The order of the
 * tests is the order of the list: `single-dose` precedes the tests of separation.
 */
export const existenceStatuses = [
  'exists',
  'no-data',
  'all-nonresponse',
  'all-response',
  'single-dose',
  'separated-increasing',
  'separated-decreasing',
  'quasi-separated-increasing',
  'quasi-separated-decreasing',
] as const;

export type ExistenceStatus = (typeof existenceStatuses)[number];

/**
 * Decides from the data alone whether a maximum-likelihood fit exists.
 *
 * @param x doses, working scale. @param n subjects per row. @param y responses per row. @param count rows in use.
 * Source: overlap condition of Silvapulle (1981, JRSS B 43:310-313) and Albert & Anderson (1984, Biometrika 71:1-10).
 */
export function existenceStatus(
  x: ArrayLike<number>,
  n: ArrayLike<number>,
  y: ArrayLike<number>,
  count: number,
): ExistenceStatus {
  let lowResponse = Infinity;
  let highResponse = -Infinity;
  let lowNonresponse = Infinity;
  let highNonresponse = -Infinity;
  for (let i = 0; i < count; i++) {
    const dose = x[i] as number;
    if ((y[i] as number) > 0) {
      if (dose < lowResponse) lowResponse = dose;
      if (dose > highResponse) highResponse = dose;
    }
    if ((n[i] as number) - (y[i] as number) > 0) {
      if (dose < lowNonresponse) lowNonresponse = dose;
      if (dose > highNonresponse) highNonresponse = dose;
    }
  }
  const anyResponse = lowResponse < Infinity;
  const anyNonresponse = lowNonresponse < Infinity;
  if (!anyResponse) return anyNonresponse ? 'all-nonresponse' : 'no-data';
  if (!anyNonresponse) return 'all-response';
  if (Math.min(lowResponse, lowNonresponse) === Math.max(highResponse, highNonresponse)) return 'single-dose';
  if (highNonresponse < lowResponse) return 'separated-increasing';
  if (highResponse < lowNonresponse) return 'separated-decreasing';
  if (highNonresponse === lowResponse) return 'quasi-separated-increasing';
  if (highResponse === lowNonresponse) return 'quasi-separated-decreasing';
  return 'exists';
}
