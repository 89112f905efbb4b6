import type { CourseCohort, CourseData, CourseText } from './course-data';

/** Width of a text of the drawing, in its units: an upper estimate for 12 px Commissioner. */
export function textWidth(text: string, strong = false): number {
  return text.length * (strong ? 6.9 : 6.4);
}

interface Candidate {
  x: number;
  texts: string[];
  strong: boolean;
  rank: number;
}

function stateWord(cohort: CourseCohort): string {
  return cohort.state.replaceAll('-', ' ');
}

/**
 * The names below the columns. The current cohort and the proposed one come first, then the first, then the others
 * as far as they fit without touching; a long name gives way to its short form before it is left out.
 * @param xOf the middle of a column, by its index; the proposed column follows the cohorts
 */
export function cohortLabels(
  data: CourseData,
  current: number,
  xOf: (column: number) => number,
  y: number,
  width: number,
): CourseText[] {
  const last = data.cohorts.length - 1;
  const candidates = data.cohorts.map((cohort, column): Candidate => {
    const number = String(cohort.number);
    if (column === current && cohort.state !== 'signed') {
      return { x: xOf(column), texts: [`${number} · ${stateWord(cohort)}`, number], strong: true, rank: 0 };
    }
    const texts = column === 0 ? [`cohort ${number}`, number] : [number];
    if (cohort.state === 'cancelled') texts.unshift(`${number} cancelled`);
    return {
      x: xOf(column),
      texts,
      strong: column === current,
      rank: column === current ? 0 : column === 0 ? 2 : 3,
    };
  });
  if (data.proposed) {
    const { number } = data.proposed;
    candidates.push({ x: xOf(last + 1), texts: [`${number} proposed`, `${number}`], strong: false, rank: 1 });
  }
  // The middle columns are thinned evenly: columns divisible by 10, then by 5, then by 2, then the rest.
  const thinning = (label: Candidate) => {
    const number = Number(label.texts.at(-1));
    return number % 10 === 0 ? 0 : number % 5 === 0 ? 1 : number % 2 === 0 ? 2 : 3;
  };
  candidates.sort((a, b) => a.rank - b.rank || thinning(a) - thinning(b) || a.x - b.x);

  const taken: { from: number; to: number }[] = [];
  const labels: CourseText[] = [];
  for (const { x, texts, strong } of candidates) {
    for (const text of texts) {
      const half = textWidth(text, strong) / 2;
      const centre = Math.min(Math.max(x, half), width - half);
      const from = centre - half - 4;
      const to = centre + half + 4;
      if (taken.some((other) => from < other.to && other.from < to)) continue;
      taken.push({ from, to });
      labels.push({ x: centre, y, text, anchor: 'middle', ...(strong ? { strong } : {}) });
      break;
    }
  }
  return labels.sort((a, b) => a.x - b.x);
}
