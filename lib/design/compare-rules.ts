import type { Design } from '@/lib/schemas/design';
import type { CohortHistory, History } from './history';
import { summaryOf, type RecommendationSummary } from './recommendation-summary';
import { replay } from './replay';
import type { DesignFailure, Result } from './result';

/** What one design would have recommended after a cohort, beside what was released for it. */
export interface ComparedStep extends RecommendationSummary {
  readonly cohort: number;
}

/** One design's course on the recorded history, or why it has none. */
export interface ComparedDesign {
  readonly label: string;
  readonly course: Result<readonly ComparedStep[], DesignFailure>;
}

/**
 * "What would each have recommended": every design replayed from cohort 1 on the same recorded history, with doses really
 * given and the stored marks. Released doses need not be doses of the design tried. All designs must share the trial's unit
 * and response; a cohort's recommendation never changes what was given next.
 */
export function compareDesigns(
  designs: readonly { readonly label: string; readonly design: Design }[],
  history: History,
): ComparedDesign[] {
  return designs.map(({ label, design }) => {
    const steps: ComparedStep[] = [];
    const replayed = replay([{ fromCohort: 1, design }], history, {
      requireDesignDoses: false,
      afterCohort: (compiled, trial, cohort) => {
        steps.push({ cohort: cohort.number, ...summaryOf(compiled, trial) });
      },
    });
    return { label, course: replayed.ok ? { ok: true, value: steps } : replayed };
  });
}

/** The released doses of a history, to set beside a comparison. */
export function releasedDoses(history: History): { cohort: number; dose: CohortHistory['released'] }[] {
  return history.cohorts.map(({ number, released }) => ({ cohort: number, dose: released }));
}
