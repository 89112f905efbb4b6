import type { Cohort, TrialState } from '@/lib/conduct/state';
import { placesOf } from '@/lib/conduct/trial-facts';
import { compareDecimals } from '@/lib/design/decimal';
import { wilsonInterval } from '@/lib/design/estimate/proportion';

/** Confidence level of the intervals on pages. */
export const INTERVAL_LEVEL = 0.95;

/** What was seen at one dose really given, with its Wilson interval (Wilson 1927; Newcombe 1998). */
export interface ProportionAtDose {
  readonly dose: string;
  readonly responses: number;
  readonly evaluable: number;
  readonly low: number;
  readonly high: number;
}

/** Responses and evaluable subjects by dose really given, over the cohorts given, rising. */
export function proportionsByDose(state: TrialState, cohorts: readonly Cohort[]): ProportionAtDose[] {
  const counts = new Map<string, { responses: number; evaluable: number }>();
  for (const subject of cohorts.flatMap((cohort) => placesOf(state, cohort.id))) {
    if (subject.doseGiven === null || (subject.outcome !== 'present' && subject.outcome !== 'absent'))
      continue;
    const count = counts.get(subject.doseGiven) ?? { responses: 0, evaluable: 0 };
    counts.set(subject.doseGiven, {
      responses: count.responses + (subject.outcome === 'present' ? 1 : 0),
      evaluable: count.evaluable + 1,
    });
  }
  return [...counts]
    .sort(([a], [b]) => compareDecimals(a, b))
    .map(([dose, { responses, evaluable }]) => {
      const { lower, upper } = wilsonInterval(responses, evaluable, INTERVAL_LEVEL);
      return { dose, responses, evaluable, low: lower, high: upper };
    });
}
