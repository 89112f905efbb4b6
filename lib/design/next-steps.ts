import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import type { CohortHistory, History } from './history';
import { recommendationSummary, type RecommendationSummary } from './recommendation-summary';
import type { DesignVersion } from './replay';
import { success, type DesignFailure, type Result } from './result';

/** Most rows a next-step table may have. */
export const NEXT_STEP_ROWS = 20_000;
/** Most cohorts it may look ahead. */
export const NEXT_STEP_DEPTH = 6;

/** What would follow from one number of responses, and, to the depth asked for, from each one after it. */
export interface NextStep extends RecommendationSummary {
  readonly responses: number;
  /** The rows of the cohort after; empty at the last depth and where the trial would stop. */
  readonly next: readonly NextStep[];
}

/** The next-step table: from the dose of the coming cohort, every possible number of responses. */
export interface NextSteps {
  /** The dose the coming cohort is taken to be given. */
  readonly dose: Dose;
  /** Evaluable subjects of each cohort looked ahead. */
  readonly subjects: number;
  readonly steps: readonly NextStep[];
}

export interface NextStepOptions {
  /** Evaluable subjects of a cohort; default the design's cohort size. */
  readonly subjects?: number;
  /** The dose of the coming cohort; default the recommended one (the starting dose at first). */
  readonly released?: Dose;
  /** Whether that dose was signed below its recommendation; default false. */
  readonly loweredRelease?: boolean;
  /** Cohorts to look ahead, 1 to {@link NEXT_STEP_DEPTH}; default 1. */
  readonly depth?: number;
}

/**
 * The next-step table from any state: for every number of responses in the coming cohort the dose that would follow, by the
 * same steps 1 to 8. Deeper rows take every cohort at its recommended dose.
 *
 * @returns null where no dose is left to give. @throws RangeError for a depth or size that would exceed the limits.
 */
export function nextSteps(
  design: Design,
  history: History,
  options: NextStepOptions = {},
): Result<NextSteps | null, DesignFailure> {
  return nextStepsUnder([{ fromCohort: 1, design }], history, options);
}

/** The same for a trial whose design was amended; a version from the coming cohort on is in force for it. */
export function nextStepsUnder(
  versions: readonly DesignVersion[],
  history: History,
  options: NextStepOptions = {},
): Result<NextSteps | null, DesignFailure> {
  const coming = history.cohorts.length + 1;
  const inForce = versions.filter((version) => version.fromCohort <= coming).at(-1)?.design;
  const subjects = options.subjects ?? inForce?.cohortSize ?? 1;
  const depth = options.depth ?? 1;
  checkSize(subjects, depth);
  let dose = options.released ?? null;
  if (dose === null) {
    const now = recommendationSummary(versions, history);
    if (!now.ok) return now;
    dose = now.value.dose;
    if (dose === null) return success(null);
  }
  const lowered = options.loweredRelease ?? false;
  const steps = stepsFrom(versions, history.cohorts, dose, lowered, subjects, depth);
  return steps.ok ? success({ dose, subjects, steps: steps.value }) : steps;
}

function checkSize(subjects: number, depth: number): void {
  if (!Number.isInteger(depth) || depth < 1 || depth > NEXT_STEP_DEPTH) {
    throw new RangeError(`The table looks ahead 1 to ${NEXT_STEP_DEPTH} cohorts, not ${depth}.`);
  }
  if (!Number.isInteger(subjects) || subjects < 1 || (subjects + 1) ** depth > NEXT_STEP_ROWS) {
    throw new RangeError(
      `A table of ${subjects} subjects over ${depth} cohorts has more than ${NEXT_STEP_ROWS} rows.`,
    );
  }
}

function stepsFrom(
  versions: readonly DesignVersion[],
  cohorts: readonly CohortHistory[],
  dose: Dose,
  loweredRelease: boolean,
  subjects: number,
  depth: number,
): Result<NextStep[], DesignFailure> {
  const steps: NextStep[] = [];
  for (let responses = 0; responses <= subjects; responses += 1) {
    const cohort: CohortHistory = {
      number: cohorts.length + 1,
      released: dose,
      loweredRelease,
      subjects: Array.from({ length: subjects }, (_, i) => ({ given: dose, response: i < responses })),
    };
    const ahead = [...cohorts, cohort];
    const summary = recommendationSummary(versions, { cohorts: ahead });
    if (!summary.ok) return summary;
    let next: readonly NextStep[] = [];
    if (depth > 1 && summary.value.kind === 'dose' && summary.value.dose !== null) {
      const deeper = stepsFrom(versions, ahead, summary.value.dose, false, subjects, depth - 1);
      if (!deeper.ok) return deeper;
      next = deeper.value;
    }
    steps.push({ responses, ...summary.value, next });
  }
  return success(steps);
}
