import { doseNumber } from '@/lib/design/dose-text';
import type { CourseData } from './course-data';

/** A dose that stands at the side of the drawing. `used` ones are named before others when room is short. */
export interface DoseTick {
  dose: number;
  text: string;
  used: boolean;
}

/** The working scale's value of a dose. @throws RangeError for a dose that has no place on the scale */
export function workingValue(dose: string | number, scale: CourseData['scale']): number {
  const value = Number(dose);
  if (!Number.isFinite(value) || (scale === 'log' && value <= 0)) {
    throw new RangeError(`The dose ${dose} has no place on a ${scale} scale.`);
  }
  return scale === 'log' ? Math.log(value) : value;
}

/** Round doses over a span: 1, 2 and 5 times powers of ten on a log scale, even steps on a linear one; both ends included. */
export function roundDoses(minimum: number, maximum: number, scale: CourseData['scale']): number[] {
  const doses = new Set([minimum, maximum]);
  if (scale === 'log') {
    for (let power = Math.floor(Math.log10(minimum)); power <= Math.log10(maximum); power += 1) {
      for (const factor of [1, 2, 5]) doses.add(Number(`${factor}e${power}`));
    }
  } else if (maximum > minimum) {
    const rough = (maximum - minimum) / 5;
    const power = 10 ** Math.floor(Math.log10(rough));
    const step = ([1, 2, 5, 10].find((factor) => factor * power >= rough) ?? 10) * power;
    for (let index = Math.ceil(minimum / step); index * step <= maximum; index += 1) {
      doses.add(Number((index * step).toPrecision(12)));
    }
  }
  return [...doses].filter((dose) => dose >= minimum && dose <= maximum).sort((a, b) => a - b);
}

/** The doses at the side of the drawing: the levels, or round doses of the range; every dose once, rising. */
export function doseTicks(data: CourseData): DoseTick[] {
  const used = new Set(
    [...data.cohorts, ...(data.proposed ? [data.proposed] : [])].map(({ dose }) => Number(dose)),
  );
  const texts = new Map<number, string>();
  if (data.levels) for (const level of data.levels) texts.set(Number(level), String(level));
  else if (data.range) {
    const { minimum, maximum } = data.range;
    for (const dose of roundDoses(Number(minimum), Number(maximum), data.scale))
      texts.set(dose, String(dose));
  }
  for (const { dose } of data.cohorts) texts.set(Number(dose), String(dose));
  if (data.proposed) texts.set(Number(data.proposed.dose), String(data.proposed.dose));
  return [...texts]
    .map(([dose, text]) => ({
      dose,
      text: doseNumber(data.notation ?? 'plain', text),
      used: used.has(dose),
    }))
    .sort((a, b) => a.dose - b.dose);
}

/**
 * Which of the ticks can be named when names need `gap` between them: first the ends, then doses used, then the rest
 * as far as there is room. @param heights the place of each tick, in the same order
 */
export function namedTicks(ticks: readonly DoseTick[], heights: readonly number[], gap: number): Set<number> {
  const order = ticks
    .map((tick, index) => ({
      index,
      rank: index === 0 ? 0 : index === ticks.length - 1 ? 1 : tick.used ? 2 : 3,
    }))
    .sort((a, b) => a.rank - b.rank || a.index - b.index);
  const named = new Set<number>();
  for (const { index } of order) {
    const height = heights[index] ?? 0;
    if ([...named].every((other) => Math.abs((heights[other] ?? 0) - height) >= gap)) named.add(index);
  }
  return named;
}
