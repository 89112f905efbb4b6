import type { Design } from '@/lib/schemas/design';
import { compileDesign, newTrial, type CompiledDesign } from '@/lib/design/compiled';
import { binomialProbability } from '@/lib/design/distributions/binomial';
import { nearestIndex } from '@/lib/design/dose-set';
import { STEP } from '@/lib/design/rules/rule';
import { completeCohort } from '@/lib/design/step';
import { STOP } from '@/lib/design/stopping';
import { PLACE, type TrialState } from '@/lib/design/trial-state';

/** Exact operating characteristics of a design on levels, by all outcomes of all cohorts. */
export interface ExactCharacteristics {
  /** Entry 0: stopped with all levels closed; entry j: level j is recommended at the end. */
  recommended: number[];
  /** Nearest level to the mean of x_1 … x_{K+1}, entry 0 as above. */
  recommendedByAverage: number[];
  responses: number[];
  subjectsByLevel: number[];
  responsesByLevel: number[];
  expectedSubjects: number;
  meanFinal: number;
  leaves: number;
}

/**
 * Walks the whole outcome tree of a design through `completeCohort`, with every subject given the recommended level.
 *
 * @param p response probability of each level. @param cohorts cohorts of the trial. @param m cohort size.
 */
export function enumerateTrial(design: Design, p: readonly number[]): ExactCharacteristics {
  const compiled = compileDesign(design);
  const { maximumCohorts: cohorts, cohortSize: m } = design;
  const states = Array.from({ length: cohorts + 1 }, () => newTrial(compiled));
  const levels = p.length;
  const zero = (n: number) => Array<number>(n).fill(0);
  const result: ExactCharacteristics = {
    recommended: zero(levels + 1),
    recommendedByAverage: zero(levels + 1),
    responses: zero(cohorts * m + 1),
    subjectsByLevel: zero(levels),
    responsesByLevel: zero(levels),
    expectedSubjects: 0,
    meanFinal: 0,
    leaves: 0,
  };
  let completed = 0;

  const leaf = (trial: TrialState, weight: number, stopped: boolean) => {
    result.leaves += 1;
    add(result.responses, trial.responses, weight);
    result.expectedSubjects += weight * trial.subjects;
    for (let j = 0; j < levels; j += 1) {
      add(result.subjectsByLevel, j, weight * (trial.levelN[j] as number));
      add(result.responsesByLevel, j, weight * (trial.levelY[j] as number));
    }
    if (stopped) {
      add(result.recommended, 0, weight);
      add(result.recommendedByAverage, 0, weight);
      return;
    }
    completed += weight;
    let sum = 0;
    for (let i = 0; i <= trial.steps; i += 1) sum += trial.iterates[i] as number;
    add(result.recommended, (trial.place[PLACE.FINAL] as number) + 1, weight);
    const average = nearestIndex(compiled.doses, sum / (trial.steps + 1), false);
    add(result.recommendedByAverage, average + 1, weight);
    result.meanFinal += weight * (trial.iterates[trial.steps] as number);
  };

  const walk = (depth: number, weight: number) => {
    const trial = states[depth] as TrialState;
    const index = trial.place[PLACE.FINAL] as number;
    for (let y = 0; y <= m; y += 1) {
      const next = states[depth + 1] as TrialState;
      next.copyFrom(trial);
      const branch = weight * binomialProbability(y, m, p[index] as number);
      advance(compiled, next, index, m, y);
      const stopped = (next.stop & STOP.closedAll) !== 0;
      if (stopped || depth + 1 === cohorts) leaf(next, branch, stopped);
      else walk(depth + 1, branch);
    }
  };
  walk(0, 1);
  result.meanFinal /= completed;
  return result;
}

function advance(compiled: CompiledDesign, trial: TrialState, index: number, m: number, y: number): void {
  const x = compiled.doses.working(index);
  trial.beginCohort();
  trial.addSubjects(x, m, y);
  if (completeCohort(compiled, trial, x, false) !== STEP.done) throw new Error('A step failed.');
}

function add(list: number[], index: number, weight: number): void {
  list[index] = (list[index] as number) + weight;
}
