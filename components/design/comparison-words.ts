import { equalDecimals } from '@/lib/design/decimal';
import type { ComparedRules } from './comparison';

const same = (a: string | null, b: string | null): boolean =>
  a === null || b === null ? a === b : equalDecimals(a, b);

/** The finding of a comparison in one sentence: for how many cohorts the rules agree. */
export function comparisonFinding({ rules, released }: ComparedRules): string {
  const courses = rules.flatMap(({ doses }) => (doses === null ? [] : [doses]));
  const first = courses[0];
  if (courses.length < 2 || first === undefined) return 'Fewer than two rules gave a course to compare.';
  const names = courses.length === 2 ? 'Both rules' : `The ${courses.length} rules`;
  const differing = released
    .map((_, index) => index)
    .filter((index) =>
      courses.some((course) => !same(course[index]?.dose ?? null, first[index]?.dose ?? null)),
    )
    .map((index) => index + 1);
  if (differing.length === 0) return `${names} recommend the same dose for every cohort.`;
  const agreed = released.length - differing.length;
  return `${names} recommend the same dose for ${agreed} of ${released.length} cohorts; they differ for ${differing.length === 1 ? 'cohort' : 'cohorts'} ${differing.join(', ')}.`;
}
