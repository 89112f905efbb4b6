import { cohortLabels, textWidth } from './course-labels';
import type { CourseData, CourseShapes, CourseText } from './course-data';
import { doseTicks, namedTicks, workingValue } from './course-scale';
import { estimateInWords } from './course-words';

const WIDTH = 900;
const NARROWEST_LEFT = 60;
const RIGHT = 20;
const TOP = 35;
const BELOW = 30;
const COLUMN = 120;
const NARROWEST_COLUMN = 30;
const LABEL_GAP = 13;
const FILLED = 6;
const OPEN = 5;

/** The height of the stairs: 125 for up to nine doses, more for more, so that neighbouring doses stay apart. */
function plotHeight(doses: number): number {
  return Math.min(250, Math.max(125, 125 + (doses - 9) * 4));
}

/** Marks of a cohort in rows of at most `perRow`, centred over the step, the first row just above it. */
function placeMarks(
  marks: NonNullable<CourseData['cohorts'][number]['marks']>,
  middle: number,
  column: number,
  stepY: number,
): CourseShapes['marks'] {
  const room = column - 10;
  const perRow = Math.max(1, Math.min(marks.length, Math.floor(room / (2 * FILLED + 2))));
  const spacing = Math.min(25, room / perRow);
  return marks.map((outcome, index) => {
    const row = Math.floor(index / perRow);
    const inRow = Math.min(perRow, marks.length - row * perRow);
    return {
      x: middle + ((index % perRow) - (inRow - 1) / 2) * spacing,
      y: stepY - 9 - row * (2 * FILLED + 2),
      radius: outcome === 'present' ? FILLED : OPEN,
      outcome,
    };
  });
}

type Drawn = Pick<CourseShapes, 'marks' | 'released' | 'proposed'>;

/** Whether a text that ends at its x lies over a mark or a step. */
function touchesAnything({ x, y, text }: CourseText, { marks, released, proposed }: Drawn): boolean {
  const from = x - textWidth(text, true);
  const top = y - 11;
  const low = y + 3;
  const overMark = marks.some(
    (mark) => mark.x + mark.radius > from && mark.y + mark.radius > top && mark.y - mark.radius < low,
  );
  const overStep = [released, proposed].some((line) =>
    line.slice(1).some(([endX, endY], index) => {
      const start = line[index];
      return (
        start &&
        Math.max(start[0], endX) > from &&
        Math.max(start[1], endY) > top &&
        Math.min(start[1], endY) < low
      );
    }),
  );
  return overMark || overStep;
}

/** The water line's text, at the right end: below the line, or above it where it would touch less there. */
function waterLabel(text: string, x: number, waterY: number, bottom: number, drawn: Drawn): CourseText {
  const at = (y: number): CourseText => ({ x, y, text, anchor: 'end', strong: true });
  const below = at(waterY + 16);
  const above = at(waterY - 7);
  if (below.y > bottom + 4) return above;
  if (above.y < 14) return below;
  return touchesAnything(below, drawn) && !touchesAnything(above, drawn) ? above : below;
}

/**
 * The course of doses as shapes: the cohorts as a flight of steps at the height of their dose on the working scale,
 * the next step apart while it is not signed, the water line at the estimate with its interval. Columns narrow and the
 * plane widens as cohorts grow many; texts never overlap: what finds no room is left out, ends and used doses last.
 * @throws RangeError when a dose has no place on the scale (zero on a log scale)
 */
export function courseShapes(data: CourseData): CourseShapes {
  const shapes = shapesWithin(data, 0);
  const estimate = estimateInWords(data);
  if (!shapes.water || !touchesAnything(shapes.water.label, shapes)) return shapes;
  return shapesWithin(data, textWidth(estimate, true));
}

/** @param reserve room kept free of columns at the right end, for the estimate's text */
function shapesWithin(data: CourseData, reserve: number): CourseShapes {
  const ticks = doseTicks(data);
  const left = Math.max(
    NARROWEST_LEFT,
    20 + Math.max(...ticks.map(({ text }, index) => textWidth(index === 0 ? `${text} ${data.unit}` : text))),
  );
  const values = ticks.map(({ dose }) => workingValue(dose, data.scale));
  const lowest = values[0] ?? 0;
  const highest = values.at(-1) ?? 0;
  const stairs = plotHeight(ticks.length);
  const bottom = TOP + stairs;
  const heightOf = (dose: string | number) => {
    if (highest === lowest) return TOP + stairs / 2;
    const share = (workingValue(dose, data.scale) - lowest) / (highest - lowest);
    return bottom - Math.min(1, Math.max(0, share)) * stairs;
  };

  const columns = Math.max(1, data.cohorts.length + (data.proposed ? 1 : 0));
  const column = Math.max(
    NARROWEST_COLUMN,
    Math.min(COLUMN, (WIDTH - left - RIGHT - Math.max(40, reserve)) / columns),
  );
  const width = Math.max(WIDTH, left + 10 + columns * column + RIGHT + Math.max(10, reserve));
  const right = width - RIGHT;
  const startOf = (index: number) => left + 10 + index * column;
  const middleOf = (index: number) => startOf(index) + column / 2;

  const released: [number, number][] = [];
  const marks: CourseShapes['marks'] = [];
  data.cohorts.forEach((cohort, index) => {
    const y = heightOf(cohort.dose);
    released.push([startOf(index), y], [startOf(index + 1), y]);
    if (cohort.marks) marks.push(...placeMarks(cohort.marks, middleOf(index), column, y));
  });
  const proposed: [number, number][] = [];
  if (data.proposed) {
    const index = data.cohorts.length;
    const y = heightOf(data.proposed.dose);
    const before = released.at(-1);
    if (before) proposed.push(before);
    proposed.push([startOf(index), y], [startOf(index + 1), y]);
  }

  const heights = ticks.map(({ dose }) => heightOf(dose));
  const named = namedTicks(ticks, heights, LABEL_GAP);
  const allLines = ticks.length < 2 || stairs / (ticks.length - 1) >= 6;
  const grid = heights
    .filter((_, index) => allLines || named.has(index))
    .map((y) => ({ x1: left, x2: right, y }));
  const doseLabels = ticks.flatMap((tick, index): CourseText[] => {
    if (!named.has(index)) return [];
    const text = index === 0 ? `${tick.text} ${data.unit}` : tick.text;
    return [{ x: left - 10, y: (heights[index] ?? 0) + 4, text, anchor: 'end' }];
  });

  const running = data.cohorts.findLastIndex(({ state }) => state !== 'cancelled');
  const current = running < 0 ? data.cohorts.length - 1 : running;
  const shapes: CourseShapes = {
    width,
    height: bottom + BELOW,
    left,
    currentX: middleOf(Math.max(0, current)),
    grid,
    doseLabels,
    cohortLabels: cohortLabels(data, current, middleOf, bottom + 22, width),
    released,
    proposed,
    marks,
  };
  if (data.estimate) {
    const { dose, low, high } = data.estimate;
    const y = heightOf(dose);
    const top = high === undefined ? undefined : heightOf(high);
    shapes.water = {
      x1: left,
      x2: right,
      y,
      ...(top !== undefined && low !== undefined ? { band: { y: top, height: heightOf(low) - top } } : {}),
      label: waterLabel(estimateInWords(data), right, y, bottom, shapes),
    };
  }
  return shapes;
}

/** The `d` of an SVG path through points. */
export function pathThrough(points: CourseShapes['released']): string {
  return points.map(([x, y], index) => `${index === 0 ? 'M' : 'L'}${round(x)} ${round(y)}`).join('');
}

/** Coordinates to a hundredth: finer is not seen and makes the page longer. */
export function round(value: number): number {
  return Math.round(value * 100) / 100;
}
