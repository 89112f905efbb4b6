import Big from 'big.js';
import type { Decimal } from './decimal';

/** A grid lowest + i × increment, held as integers of 10^−places so that every dose is exact. */
export interface ExactGrid {
  places: number;
  lowest: number;
  increment: number;
  count: number;
}

/**
 * The grid from `lowest` by `increment` to at most `highest` (canonical decimals), or why there is none:
 * `increment` (not above zero), `order` (highest not above lowest), `digits` (the doses, written as whole numbers
 * of the smallest decimal, do not fit the 53 bits of a double's integers).
 */
export function exactGrid(
  lowest: Decimal,
  highest: Decimal,
  increment: Decimal,
): ExactGrid | 'increment' | 'order' | 'digits' {
  const low = new Big(lowest);
  const step = new Big(increment);
  if (step.lte(0)) return 'increment';
  const span = new Big(highest).minus(low);
  if (span.lte(0)) return 'order';
  const decimals = (text: string) => (text.includes('.') ? text.length - text.indexOf('.') - 1 : 0);
  const places = Math.max(decimals(lowest), decimals(increment));
  const unit = new Big(10).pow(places);
  const steps = new Big(span.div(step).toFixed(20)).round(0, 0);
  // div() rounds at 20 decimals; the whole part is exact because numerator and denominator have at most 20 digits
  const last = low.plus(step.times(steps)).times(unit);
  if (last.gt(Number.MAX_SAFE_INTEGER)) return 'digits';
  return {
    places,
    lowest: Number(low.times(unit).toFixed()),
    increment: Number(step.times(unit).toFixed()),
    count: Number(steps.toFixed()) + 1,
  };
}

/** Exact canonical text of grid dose i. */
export function gridDecimal(grid: ExactGrid, index: number): Decimal {
  const digits = String(grid.lowest + index * grid.increment).padStart(grid.places + 1, '0');
  if (grid.places === 0) return digits;
  const whole = digits.slice(0, digits.length - grid.places);
  const fraction = digits.slice(digits.length - grid.places).replace(/0+$/, '');
  return fraction === '' ? whole : `${whole}.${fraction}`;
}

/** The double nearest to grid dose i (an exact integer over an exact power of ten: correctly rounded). */
export function gridValue(grid: ExactGrid, index: number): number {
  return (grid.lowest + index * grid.increment) / 10 ** grid.places;
}

/** The index of a dose on the grid, or −1 when it is none of its doses. */
export function gridIndex(grid: ExactGrid, dose: Decimal): number {
  const scaled = Number(new Big(dose).times(new Big(10).pow(grid.places)).toFixed());
  const index = (scaled - grid.lowest) / grid.increment;
  const nearest = Math.round(index);
  if (nearest < 0 || nearest >= grid.count) return -1;
  return gridDecimal(grid, nearest) === dose ? nearest : -1;
}
