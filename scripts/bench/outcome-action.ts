import { timesOf, type Times } from './aims';
import { openBenchTrial, playBenchCohort } from './bench-trial';
import type { BenchTeam } from './team';

const BATCHES = 9;
const COHORTS_A_BATCH = 5;
const COHORT_SIZE = 6;

/** Times of the command that records an outcome, parsed input to commit, milliseconds. */
export interface OutcomeTimes {
  /** Outcomes after which the cohort goes on. */
  readonly recorded: Times;
  /** The last outcome of a cohort: it completes the cohort and computes the recommendation. */
  readonly completing: Times;
}

/** Times the outcome command against the real database, on a fresh trial a batch; the first batch warms up. */
export async function measureOutcomes(team: BenchTeam): Promise<OutcomeTimes> {
  const recorded: number[] = [];
  const completing: number[] = [];
  for (let batch = 0; batch <= BATCHES; batch += 1) {
    const trial = await openBenchTrial(team, `BATCH-${batch}`, COHORT_SIZE);
    for (let number = 1; number <= COHORTS_A_BATCH; number += 1) {
      await playBenchCohort(trial, team, (milliseconds, isLast) => {
        if (batch > 0) (isLast ? completing : recorded).push(milliseconds);
      });
      if (number < COHORTS_A_BATCH) await trial.release(team.reviewers.slice(0, 2));
    }
  }
  return { recorded: timesOf(recorded), completing: timesOf(completing) };
}
