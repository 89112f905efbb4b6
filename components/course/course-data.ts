import type { Outcome } from '../ui/outcome-mark';

/** One cohort of the course, cut to what the reader may see. Doses are exact decimals as text, or numbers. */
export interface CourseCohort {
  number: number;
  dose: string | number;
  /** `open`, `under-review`, `signed` or `cancelled`. */
  state: string;
  /** The outcomes of its subjects; left out for readers who may not see them. */
  marks?: readonly Outcome[];
}

/** A trial's course of doses, as plain data. */
export interface CourseData {
  unit: string;
  /** How doses are printed; plain where left out. */
  notation?: 'plain' | 'powers-of-ten';
  /** The working scale: heights are doses, or their logarithms. */
  scale: 'linear' | 'log';
  /** The dose levels, rising; or the range of a design without levels. */
  levels?: readonly (string | number)[];
  range?: { minimum: string | number; maximum: string | number };
  cohorts: readonly CourseCohort[];
  /** The next step, not signed yet; only for readers who may see it. */
  proposed?: { number: number; dose: string | number };
  /** The dose being sought, as estimated now; with an interval where there is one. `coverage` as 0.8. */
  estimate?: { dose: string | number; low?: string | number; high?: string | number; coverage?: number };
  /** The trial's own words for the outcomes. */
  labels?: { present: string; absent: string };
}

/** A straight flight of points. */
export type Polyline = readonly (readonly [x: number, y: number])[];

/** A text with its anchor; `strong` marks the cohort the reader is at. */
export interface CourseText {
  x: number;
  y: number;
  text: string;
  anchor: 'start' | 'middle' | 'end';
  strong?: boolean;
}

/** The course as shapes on a plane of `width` by `height`, for a page's SVG and a report's paths alike. */
export interface CourseShapes {
  width: number;
  height: number;
  /** Where the steps begin; the doses' names stand to its left. */
  left: number;
  /** Where the current cohort stands, for a frame that scrolls. */
  currentX: number;
  /** Hairlines at the height of the doses. */
  grid: { x1: number; x2: number; y: number }[];
  doseLabels: CourseText[];
  cohortLabels: CourseText[];
  released: Polyline;
  proposed: Polyline;
  marks: { x: number; y: number; radius: number; outcome: Outcome }[];
  water?: { x1: number; x2: number; y: number; band?: { y: number; height: number }; label: CourseText };
}
