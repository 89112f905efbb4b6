import { compareDecimals, equalDecimals } from '@/lib/design/decimal';
import { exactGrid, gridDecimal, gridIndex } from '@/lib/design/dose-grid';
import type { Doses } from '@/lib/schemas/design';

/** True when a dose is a level, or a dose of the grid, of the design. */
export function isDesignDose(doses: Doses, dose: string): boolean {
  if (doses.kind === 'levels') return doses.levels.some((level) => equalDecimals(level, dose));
  const grid = exactGrid(doses.lowest, doses.highest, doses.increment);
  return typeof grid !== 'string' && gridIndex(grid, dose) >= 0;
}

/** The design's doses below one, highest first: at most `limit` of them. */
export function dosesBelow(doses: Doses, dose: string, limit = 200): string[] {
  if (doses.kind === 'levels') {
    return doses.levels
      .filter((level) => compareDecimals(level, dose) < 0)
      .reverse()
      .slice(0, limit);
  }
  const grid = exactGrid(doses.lowest, doses.highest, doses.increment);
  if (typeof grid === 'string') return [];
  const at = gridIndex(grid, dose);
  const below: string[] = [];
  for (let index = at - 1; index >= 0 && below.length < limit; index -= 1)
    below.push(gridDecimal(grid, index));
  return below;
}
