import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { decimalToNumber } from './decimal';
import { exactGrid, gridDecimal, gridIndex, gridValue, type ExactGrid } from './dose-grid';
import { fromWorking, toWorking, type Scale } from './scale';

/** Share of a gap within which a value counts as lying on its midpoint or bound. */
export const TIE_SHARE = 1e-9;

/**
 * The doses a design can release, lowest first, by index from 0: listed levels, or a grid. All methods but `dose` and
 * `indexOf` allocate nothing.
 */
export interface DoseSet {
  readonly kind: Design['doses']['kind'];
  readonly count: number;
  /** Exact decimal of a dose. */
  dose(index: number): Dose;
  /** The same as a double, in the trial's unit. */
  value(index: number): number;
  /** w(dose). */
  working(index: number): number;
  /** Index of a design dose (canonical decimal), or −1. */
  indexOf(dose: Dose): number;
  /** Rough index near x, any integer; {@link nearestIndex} corrects it. */
  guess(x: number): number;
}

class LevelSet implements DoseSet {
  readonly kind = 'levels';
  readonly count: number;
  private readonly values: Float64Array;
  private readonly workings: Float64Array;

  constructor(
    private readonly levels: readonly Dose[],
    scale: Scale,
  ) {
    this.count = levels.length;
    this.values = Float64Array.from(levels, decimalToNumber);
    this.workings = this.values.map((value) => toWorking(scale, value));
  }

  dose(index: number): Dose {
    return this.levels[index] as Dose;
  }
  value(index: number): number {
    return this.values[index] as number;
  }
  working(index: number): number {
    return this.workings[index] as number;
  }
  indexOf(dose: Dose): number {
    return this.levels.indexOf(dose);
  }
  guess(): number {
    return 0;
  }
}

class GridSet implements DoseSet {
  readonly kind = 'range';
  readonly count: number;
  private readonly step: number;
  private readonly lowest: number;

  constructor(
    private readonly grid: ExactGrid,
    private readonly scale: Scale,
  ) {
    this.count = grid.count;
    this.lowest = gridValue(grid, 0);
    this.step = gridValue(grid, 1) - this.lowest;
  }

  dose(index: number): Dose {
    return gridDecimal(this.grid, index);
  }
  value(index: number): number {
    return gridValue(this.grid, index);
  }
  working(index: number): number {
    return toWorking(this.scale, gridValue(this.grid, index));
  }
  indexOf(dose: Dose): number {
    return gridIndex(this.grid, dose);
  }
  guess(x: number): number {
    return Math.floor((fromWorking(this.scale, x) - this.lowest) / this.step);
  }
}

/** The doses of a validated design. Throws a RangeError for doses its schema would have refused. */
export function doseSetOf(doses: Design['doses'], scale: Scale): DoseSet {
  if (doses.kind === 'levels') return new LevelSet(doses.levels, scale);
  const grid = exactGrid(doses.lowest, doses.highest, doses.increment);
  if (typeof grid === 'string') throw new RangeError(`The range of doses is no grid: ${grid}.`);
  return new GridSet(grid, scale);
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
  const last = doses.count - 1;
  const guess = doses.guess(x);
  let index = guess > 0 ? (guess < last ? guess : last) : 0;
  while (index > 0 && isAtMostMidpoint(doses, index - 1, x, tiesHigher)) index -= 1;
  while (index < last && !isAtMostMidpoint(doses, index, x, tiesHigher)) index += 1;
  return index;
}

function isAtMostMidpoint(doses: DoseSet, index: number, x: number, tiesHigher: boolean): boolean {
  const low = doses.working(index);
  const gap = doses.working(index + 1) - low;
  const middle = low + gap / 2;
  return tiesHigher ? x < middle - TIE_SHARE * gap : x <= middle + TIE_SHARE * gap;
}

/** True when x lies within 1e-9 of a gap of the midpoint above dose `index`. */
export function isTie(doses: DoseSet, index: number, x: number): boolean {
  if (index < 0 || index >= doses.count - 1) return false;
  const gap = doses.working(index + 1) - doses.working(index);
  return Math.abs(x - midpoint(doses, index)) <= TIE_SHARE * gap;
}

/**
 * Index of the highest dose at most `bound` on the working scale, one that exceeds it by at most 1e-9 of the gap below it
 * included; −1 when even the lowest exceeds it.
 */
export function highestAtMost(doses: DoseSet, bound: number): number {
  const last = doses.count - 1;
  const guess = doses.guess(bound);
  let index = guess > 0 ? (guess < last ? guess : last) : 0;
  while (index < last && isWithin(doses, index + 1, bound)) index += 1;
  while (index >= 0 && !isWithin(doses, index, bound)) index -= 1;
  return index;
}

function isWithin(doses: DoseSet, index: number, bound: number): boolean {
  const x = doses.working(index);
  const neighbour = index > 0 ? doses.working(index - 1) : doses.working(1);
  return x <= bound + TIE_SHARE * Math.abs(x - neighbour);
}

/** Index of the highest dose strictly below x on the working scale; −1 when there is none. */
export function highestBelow(doses: DoseSet, x: number): number {
  const last = doses.count - 1;
  const guess = doses.guess(x);
  let index = guess > 0 ? (guess < last ? guess : last) : 0;
  while (index < last && doses.working(index + 1) < x) index += 1;
  while (index >= 0 && doses.working(index) >= x) index -= 1;
  return index;
}
