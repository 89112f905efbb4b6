import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { decimalToNumber } from './decimal';
import { exactGrid, gridDecimal, gridIndex, gridValue, type ExactGrid } from './dose-grid';
import { toWorking, type Scale } from './scale';

/** Share of a gap within which a value counts as lying on its midpoint or bound. */
export const TIE_SHARE = 1e-9;

/** The doses a design can release, lowest first, by index from 0: listed levels, or a grid. */
export class DoseSet {
  readonly kind: Design['doses']['kind'];
  readonly count: number;
  /** w of each dose. */
  readonly workings: Float64Array;

  /** @param levels canonical decimals, rising; empty for a grid. */
  constructor(
    private readonly levels: readonly Dose[],
    private readonly grid: ExactGrid | null,
    scale: Scale,
  ) {
    this.kind = grid === null ? 'levels' : 'range';
    this.count = grid === null ? levels.length : grid.count;
    this.workings = new Float64Array(this.count);
    for (let i = 0; i < this.count; i += 1) this.workings[i] = toWorking(scale, this.value(i));
  }

  /** Exact decimal of a dose. */
  dose(index: number): Dose {
    return this.grid === null ? (this.levels[index] as Dose) : gridDecimal(this.grid, index);
  }

  /** The same as a double, in the trial's unit. */
  value(index: number): number {
    return this.grid === null ? decimalToNumber(this.levels[index] as Dose) : gridValue(this.grid, index);
  }

  /** w(dose). */
  working(index: number): number {
    return this.workings[index] as number;
  }

  /** Index of a design dose (canonical decimal), or −1. */
  indexOf(dose: Dose): number {
    return this.grid === null ? this.levels.indexOf(dose) : gridIndex(this.grid, dose);
  }
}

/** The doses of a validated design. Throws a RangeError for doses its schema would have refused. */
export function doseSetOf(doses: Design['doses'], scale: Scale): DoseSet {
  if (doses.kind === 'levels') return new DoseSet(doses.levels, null, scale);
  const grid = exactGrid(doses.lowest, doses.highest, doses.increment);
  if (typeof grid === 'string') throw new RangeError(`The range of doses is no grid: ${grid}.`);
  return new DoseSet([], grid, scale);
}

/** The midpoint of dose i and the next on the working scale. */
export function midpoint(doses: DoseSet, index: number): number {
  const low = doses.working(index);
  return low + (doses.working(index + 1) - low) / 2;
}

/**
 * METHODS step 4: index of the dose nearest x on the working scale. A value within 1e-9 of a gap of its midpoint is a tie
 * and goes to the lower dose, or to the higher where `tiesHigher`. Beyond the ends: the end dose.
 */
export function nearestIndex(doses: DoseSet, x: number, tiesHigher: boolean): number {
  return nearestIndexAt(doses.workings, Float64Array.of(x), 0, tiesHigher);
}

/**
 * The same for `values[at]` among rising working values. Numbers come in and go out through typed arrays because a double
 * handed to a function that is not inlined is boxed, and a step must allocate nothing.
 */
export function nearestIndexAt(
  workings: Float64Array,
  values: Float64Array,
  at: number,
  tiesHigher: boolean,
): number {
  const x = values[at] as number;
  const share = tiesHigher ? -TIE_SHARE : TIE_SHARE;
  let low = 0;
  let high = workings.length - 1;
  // the lowest dose whose midpoint above is not passed; midpoints rise, so halve
  while (low < high) {
    const middle = (low + high) >> 1;
    const dose = workings[middle] as number;
    const gap = (workings[middle + 1] as number) - dose;
    const bound = dose + gap / 2 + share * gap;
    if (tiesHigher ? x < bound : x <= bound) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** True when x lies within 1e-9 of a gap of the midpoint above dose `index`. */
export function isTie(doses: DoseSet, index: number, x: number): boolean {
  if (index < 0 || index >= doses.count - 1) return false;
  const gap = doses.working(index + 1) - doses.working(index);
  return Math.abs(x - midpoint(doses, index)) <= TIE_SHARE * gap;
}

/**
 * Index of the highest dose at most `values[at]`, one that exceeds it by at most 1e-9 of the gap below it included; −1 when
 * even the lowest exceeds it.
 */
export function highestAtMost(workings: Float64Array, values: Float64Array, at: number): number {
  const bound = values[at] as number;
  let index = workings.length - 1;
  while (index >= 0) {
    const x = workings[index] as number;
    const gap = index > 0 ? x - (workings[index - 1] as number) : (workings[1] as number) - x;
    if (x <= bound + TIE_SHARE * gap) break;
    index -= 1;
  }
  return index;
}

/** Index of the highest dose strictly below `values[at]`; −1 when there is none. */
export function highestBelow(workings: Float64Array, values: Float64Array, at: number): number {
  const x = values[at] as number;
  let low = -1;
  let high = workings.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((workings[middle] as number) < x) low = middle;
    else high = middle - 1;
  }
  return low;
}
