import { namedTicks, roundDoses, type DoseTick } from '@/components/course/course-scale';
import { toWorking } from '@/lib/design/scale';
import type { Design } from '@/lib/schemas/design';
import { computedDoseText } from './preview/computed-text';

/** One course of doses by cohort, from cohort 1; null where there is none. */
export interface ComparedCourse {
  readonly label: string;
  readonly doses: readonly (string | null)[];
  /** Whether it is what was released, which is drawn as a ground for the rest. */
  readonly isReleased: boolean;
}

export const COMPARISON_BOX = { left: 62, right: 14, top: 12, bottom: 44, height: 300, step: 84 } as const;

/** The marks courses are told apart by, in order. */
export const MARKS = ['square', 'circle', 'triangle', 'diamond', 'cross', 'ring'] as const;
export type MarkShape = (typeof MARKS)[number];

/** A course as shapes. */
export interface DrawnCourse {
  readonly label: string;
  readonly isReleased: boolean;
  readonly path: string;
  readonly mark: MarkShape;
  readonly points: readonly { readonly x: number; readonly y: number; readonly cohort: number }[];
}

/** The comparison as shapes in the drawing's own units. */
export interface ComparisonDrawing {
  readonly width: number;
  readonly cohorts: readonly { readonly number: number; readonly x: number }[];
  readonly ticks: readonly { readonly text: string; readonly y: number; readonly isNamed: boolean }[];
  readonly courses: readonly DrawnCourse[];
}

/** Courses of doses as flights of steps at the height of their dose on the working scale, set a little apart. */
export function drawComparison(
  design: Pick<Design, 'doses' | 'scale' | 'doseNotation'>,
  courses: readonly ComparedCourse[],
): ComparisonDrawing {
  const { left, right, top, bottom, height, step } = COMPARISON_BOX;
  const count = Math.max(...courses.map(({ doses }) => doses.length));
  const all = courses.flatMap(({ doses }) => doses.filter((dose) => dose !== null).map(Number));
  const ends =
    design.doses.kind === 'levels'
      ? design.doses.levels.map(Number)
      : [Number(design.doses.lowest), Number(design.doses.highest)];
  const lowest = Math.min(...ends, ...all);
  const highest = Math.max(...ends, ...all);
  const low = toWorking(design.scale, lowest);
  const span = toWorking(design.scale, highest) - low;
  const y = (dose: number) =>
    Math.round(
      (height - bottom - 8 - ((toWorking(design.scale, dose) - low) / span) * (height - top - bottom - 16)) *
        10,
    ) / 10;
  const doses = design.doses.kind === 'levels' ? ends : roundDoses(lowest, highest, design.scale);
  const text = (dose: number) =>
    design.doseNotation === 'plain' ? String(dose) : computedDoseText(dose, design.doseNotation);
  const ticks: DoseTick[] = doses.map((dose) => ({ dose, text: text(dose), used: all.includes(dose) }));
  const named = namedTicks(ticks, doses.map(y), 16);
  const x = (index: number) => left + step * index;
  return {
    width: left + step * count + right,
    cohorts: Array.from({ length: count }, (_, index) => ({ number: index + 1, x: x(index) + step / 2 })),
    ticks: ticks.map((tick, index) => ({ text: tick.text, y: y(tick.dose), isNamed: named.has(index) })),
    courses: courses.map((course, place) => {
      // Courses at the same dose lie on each other: each is moved up or down by its share of a few units.
      const offset = course.isReleased ? 0 : (place - courses.length / 2) * 4;
      const pieces: string[] = [];
      const points: { x: number; y: number; cohort: number }[] = [];
      course.doses.forEach((dose, index) => {
        if (dose === null) return;
        const height = y(Number(dose)) + offset;
        const before = course.doses[index - 1];
        const joins = index > 0 && before !== null && before !== undefined;
        pieces.push(`${joins ? 'L' : 'M'} ${x(index)} ${height} H ${x(index + 1)}`);
        const share = course.isReleased ? 0.5 : 0.2 + (0.6 * place) / Math.max(1, courses.length);
        points.push({ x: x(index) + step * share, y: height, cohort: index + 1 });
      });
      return {
        label: course.label,
        isReleased: course.isReleased,
        path: pieces.join(' '),
        mark: MARKS[place % MARKS.length] ?? 'square',
        points,
      };
    }),
  };
}
