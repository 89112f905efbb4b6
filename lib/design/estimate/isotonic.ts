import type { DoseRow } from './rows';

/** Two probabilities within this are equal when a target is looked up. */
const SAME = 1e-12;

export type IsotonicStatus = 'below-range' | 'above-range' | 'at-knot' | 'flat' | 'interior';

/** The dose at which an isotonic curve reaches a probability. */
export interface IsotonicQuantile {
  readonly status: IsotonicStatus;
  /** Ends of the flat stretch at the probability; both the estimate otherwise. */
  readonly lower: number;
  readonly upper: number;
  readonly estimate: number;
}

/** Knots of a curve: doses ascending, probabilities not falling. */
export interface Knots {
  readonly x: readonly number[];
  readonly p: readonly number[];
}

interface Block {
  n: number;
  y: number;
  sumX: number;
  first: number;
  last: number;
}

/**
 * Pools neighbouring rows (ascending doses) while `violates(previous, next)` holds of their proportions.
 */
function pool(rows: readonly DoseRow[], violates: (previous: number, next: number) => boolean): Block[] {
  const blocks: Block[] = [];
  rows.forEach(({ x, n, y }, index) => {
    let block: Block = { n, y, sumX: n * x, first: index, last: index };
    for (;;) {
      const previous = blocks[blocks.length - 1];
      if (!previous || !violates(previous.y / previous.n, block.y / block.n)) break;
      blocks.pop();
      block = {
        n: previous.n + block.n,
        y: previous.y + block.y,
        sumX: previous.sumX + block.sumX,
        first: previous.first,
        last: block.last,
      };
    }
    blocks.push(block);
  });
  return blocks;
}

/**
 * Isotonic regression of response proportions on dose, weighted by the numbers of subjects: neighbours are pooled while the
 * lower dose's value is strictly above the higher dose's.
 *
 * @param rows one row per dose, doses ascending, n > 0 (see `groupRows`).
 * @returns the fitted probability at every dose.
 * Source: pool-adjacent-violators, Ayer et al. (1955, Ann. Math. Statist. 26:641-647).
 */
export function isotonicFit(rows: readonly DoseRow[]): Knots {
  const p: number[] = [];
  for (const block of pool(rows, (previous, next) => previous > next)) {
    for (let i = block.first; i <= block.last; i++) p.push(block.y / block.n);
  }
  return { x: rows.map((row) => row.x), p };
}

/**
 * Centred isotonic regression: equal neighbours are pooled too, unless both are 0 or both 1, and each block becomes one knot
 * at the mean dose of its subjects, so that the curve rises strictly inside.
 *
 * @param rows one row per dose, doses ascending, n > 0.
 * Source: Oron & Flournoy (2017, Statist. Biopharm. Res. 9:258-267).
 */
export function centredIsotonicFit(rows: readonly DoseRow[]): Knots {
  const blocks = pool(
    rows,
    (previous, next) => previous > next || (previous === next && previous !== 0 && previous !== 1),
  );
  return {
    x: blocks.map((block) =>
      block.first === block.last ? (rows[block.first] as DoseRow).x : block.sumX / block.n,
    ),
    p: blocks.map((block) => block.y / block.n),
  };
}

/**
 * The dose at which a curve through knots has probability Γ, by linear interpolation on the working scale.
 *
 * @param knots doses ascending, probabilities not falling, at least one. @param target Γ.
 * @param ends the doses returned outside the range of probabilities; default the first and last knot.
 * @returns flat at Γ: the midpoint of the stretch; outside: the end dose, with status `below-range` or `above-range`.
 * Source: Stylianou & Flournoy (2002, Biometrics 58:171-177).
 */
export function isotonicQuantile(
  knots: Knots,
  target: number,
  ends: readonly [number, number] = [knots.x[0] as number, knots.x[knots.x.length - 1] as number],
): IsotonicQuantile {
  const { x, p } = knots;
  const last = x.length - 1;
  const at = (status: IsotonicStatus, estimate: number) => ({
    status,
    lower: estimate,
    upper: estimate,
    estimate,
  });
  if (target < (p[0] as number) - SAME) return at('below-range', ends[0]);
  if (target > (p[last] as number) + SAME) return at('above-range', ends[1]);
  let first = -1;
  let final = -1;
  for (let i = 0; i <= last; i++) {
    if (Math.abs((p[i] as number) - target) <= SAME) {
      if (first < 0) first = i;
      final = i;
    }
  }
  if (first >= 0) {
    const lower = x[first] as number;
    const upper = x[final] as number;
    if (first === final) return at('at-knot', lower);
    return { status: 'flat', lower, upper, estimate: (lower + upper) / 2 };
  }
  let i = 0;
  while ((p[i + 1] as number) < target) i++;
  const share = (target - (p[i] as number)) / ((p[i + 1] as number) - (p[i] as number));
  return at('interior', (x[i] as number) + share * ((x[i + 1] as number) - (x[i] as number)));
}

/** The dose at Γ by isotonic or centred isotonic regression of rows (one per dose, ascending, n > 0). */
export function isotonicEstimate(
  rows: readonly DoseRow[],
  target: number,
  centred = false,
): IsotonicQuantile {
  if (!centred) return isotonicQuantile(isotonicFit(rows), target);
  const ends: [number, number] = [(rows[0] as DoseRow).x, (rows[rows.length - 1] as DoseRow).x];
  return isotonicQuantile(centredIsotonicFit(rows), target, ends);
}
