import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import type { CohortHistory, History } from './history';
import { recommendationSummary } from './recommendation-summary';
import type { DesignVersion } from './replay';
import { success, type DesignFailure, type Result } from './result';

/** What the recommendation would be had one outcome been the other. */
export interface Flip {
  /** Cohort number, and the subject's place in its list, from 0. */
  readonly cohort: number;
  readonly subject: number;
  /** The outcome as recorded. */
  readonly response: boolean;
  readonly kind: 'dose' | 'stop';
  readonly dose: Dose | null;
  /** Whether the dose, or stopping, differs from the recommendation as it is. */
  readonly changes: boolean;
}

/**
 * How much hangs on single outcomes: for every subject of the last cohort, or of all, the recommendation with that one outcome
 * flipped. Subjects of a cohort with the same dose and outcome give the same flip.
 */
export function flips(
  design: Design,
  history: History,
  scope: 'last-cohort' | 'all-cohorts' = 'last-cohort',
): Result<Flip[], DesignFailure> {
  return flipsUnder([{ fromCohort: 1, design }], history, scope);
}

/** The same for a trial whose design was amended. */
export function flipsUnder(
  versions: readonly DesignVersion[],
  history: History,
  scope: 'last-cohort' | 'all-cohorts' = 'last-cohort',
): Result<Flip[], DesignFailure> {
  const now = recommendationSummary(versions, history);
  if (!now.ok) return now;
  const found: Flip[] = [];
  const first = scope === 'last-cohort' ? Math.max(0, history.cohorts.length - 1) : 0;
  for (let c = first; c < history.cohorts.length; c += 1) {
    const cohort = history.cohorts[c] as CohortHistory;
    for (let i = 0; i < cohort.subjects.length; i += 1) {
      const other = recommendationSummary(versions, flipped(history, c, i));
      if (!other.ok) return other;
      found.push({
        cohort: cohort.number,
        subject: i,
        response: cohort.subjects[i]?.response ?? false,
        kind: other.value.kind,
        dose: other.value.dose,
        changes: other.value.dose !== now.value.dose || other.value.kind !== now.value.kind,
      });
    }
  }
  return success(found);
}

function flipped(history: History, cohort: number, subject: number): History {
  return {
    cohorts: history.cohorts.map((entry, c) =>
      c !== cohort
        ? entry
        : {
            ...entry,
            subjects: entry.subjects.map((one, i) =>
              i === subject ? { ...one, response: !one.response } : one,
            ),
          },
    ),
  };
}
