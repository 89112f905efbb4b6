/** Subjects treated at one dose: the data every estimator starts from. */
export interface DoseRow {
  /** Dose on the working scale (the dose, or its natural logarithm). */
  readonly x: number;
  /** Evaluable subjects, > 0 (may be fractional where subjects are weighted). */
  readonly n: number;
  /** Responses among them, 0 ≤ y ≤ n. */
  readonly y: number;
}

/**
 * Merges rows of the same dose and sorts them by dose; rows without subjects fall away.
 *
 * @param rows doses on the working scale, compared exactly as doubles.
 * @returns one row per distinct x, ascending.
 * @throws RangeError when a row is not 0 ≤ y ≤ n with finite numbers.
 */
export function groupRows(rows: readonly DoseRow[]): DoseRow[] {
  const byDose = new Map<number, { x: number; n: number; y: number }>();
  for (const { x, n, y } of rows) {
    if (!Number.isFinite(x) || !Number.isFinite(n) || !(y >= 0 && y <= n)) {
      throw new RangeError(`A dose row needs a finite dose and 0 <= y <= n, got x=${x}, n=${n}, y=${y}.`);
    }
    if (n === 0) continue;
    const group = byDose.get(x);
    if (group) {
      group.n += n;
      group.y += y;
    } else byDose.set(x, { x, n, y });
  }
  return [...byDose.values()].sort((a, b) => a.x - b.x);
}

/** The same rows on −x, ascending: estimators of a falling response run on these. */
export function mirrorRows(rows: readonly DoseRow[]): DoseRow[] {
  return rows.map(({ x, n, y }) => ({ x: -x, n, y })).sort((a, b) => a.x - b.x);
}
