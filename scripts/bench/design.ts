import { pathToFileURL } from 'node:url';
import { compileDesign, newTrial, startTrial, type CompiledDesign } from '@/lib/design/compiled';
import type { CohortHistory } from '@/lib/design/history';
import { openStream } from '@/lib/design/random/streams';
import { recommend } from '@/lib/design/recommend';
import { completeCohortAt } from '@/lib/design/step';
import { PLACE, type TrialState } from '@/lib/design/trial-state';
import { designSchema, type Design, type RuleSettings } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';

/** Cohorts of the trial that is timed. */
const COHORTS = 30;
/** What one recommendation with trace may take, milliseconds. */
export const RECOMMENDATION_LIMIT = 0.2;

/** Times of one rule. */
export interface DesignBenchRow {
  readonly rule: string;
  /** One recommendation with trace after 30 cohorts, milliseconds: median and 95th percentile of single calls. */
  readonly recommendMedian: number;
  readonly recommendP95: number;
  /** One cohort without trace (rule's step, guardrails, stopping), microseconds, mean over whole trials. */
  readonly stepMicroseconds: number;
  /** Heap grown per step between two collections, bytes; about 0 when a step allocates nothing. */
  readonly bytesPerStep: number;
  readonly withinLimit: boolean;
}

const rules: RuleSettings[] = [
  { name: 'robbins-monro', c: 4, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
  { name: 'kesten', c: 4, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
  { name: 'joseph', slope: 0.8, priorSd: 1 },
  { name: 'virtual-observations', slope: 0.25, carryBounds: null },
  {
    name: 'adaptive-slope',
    form: 'mean',
    initialSlope: 0.25,
    slopeLow: 0.1,
    slopeHigh: 1,
    weighted: true,
    carry: 'iterate',
    carryReason: null,
  },
  { name: 'logit-ml', firth: true, c: 4, largestMove: 0.7 },
];

function benchedDesign(rule: RuleSettings): Design {
  return designSchema.parse({
    ...designDefaults('levels'),
    rule,
    maximumCohorts: COHORTS,
    stopping: { maximumSubjects: null, repeated: null, precision: null },
  });
}

/** A 30-cohort history that follows the recommendations, responses drawn from a rising curve with a fixed seed. */
function benchedHistory(design: Design): CohortHistory[] {
  const stream = openStream(20, 0);
  const levels = design.doses.kind === 'levels' ? design.doses.levels : [];
  const cohorts: CohortHistory[] = [];
  for (let number = 1; number <= COHORTS; number++) {
    const result = recommend(design, { cohorts });
    if (!result.ok) throw new Error(result.error.message);
    const released = result.value.dose ?? design.startingDose;
    const probability = 0.05 + 0.09 * levels.indexOf(released);
    const subjects = Array.from({ length: design.cohortSize }, () => ({
      given: released,
      response: stream.uniform() <= probability,
    }));
    cohorts.push({ number, released, loweredRelease: false, subjects });
  }
  return cohorts;
}

function timeRecommendation(design: Design): { median: number; p95: number } {
  const history = { cohorts: benchedHistory(design) };
  const times: number[] = [];
  for (let i = 0; i < 1500; i++) {
    const start = performance.now();
    const result = recommend(design, history);
    const time = performance.now() - start;
    if (!result.ok || result.value.lines.length === 0) throw new Error('no recommendation with trace');
    if (i >= 500) times.push(time);
  }
  times.sort((a, b) => a - b);
  return { median: times[500] as number, p95: times[950] as number };
}

/** Runs one trial without trace; responses come from a table drawn beforehand, so that only steps are timed. */
function runTrial(compiled: CompiledDesign, trial: TrialState, draws: Float64Array, number: number): void {
  const { cohortSize } = compiled.design;
  const { workings } = compiled.doses;
  let at = (number * 7919) % draws.length;
  startTrial(compiled, trial);
  for (let k = 0; k < COHORTS; k++) {
    const level = trial.place[PLACE.FINAL] as number;
    if (level < 0) break;
    let responses = 0;
    for (let i = 0; i < cohortSize; i++) {
      if ((draws[at] as number) <= 0.05 + 0.09 * level) responses++;
      at = at + 1 === draws.length ? 0 : at + 1;
    }
    trial.beginCohort();
    trial.addSubjectsAt(workings, level, cohortSize, responses);
    completeCohortAt(compiled, trial, level, false);
  }
}

function timeStep(compiled: CompiledDesign): { microseconds: number; bytes: number } {
  const stream = openStream(21, 0);
  const draws = Float64Array.from({ length: 8191 }, () => stream.uniform());
  const trial = newTrial(compiled);
  const trials = 200;
  const round = () => {
    let steps = 0;
    for (let t = 0; t < trials; t++) {
      runTrial(compiled, trial, draws, t);
      steps += trial.steps;
    }
    return steps;
  };
  for (let i = 0; i < 50; i++) round();
  let microseconds = Infinity;
  let bytes = Infinity;
  for (let i = 0; i < 50; i++) {
    const heap = process.memoryUsage().heapUsed;
    const start = performance.now();
    const steps = round();
    const time = performance.now() - start;
    const grown = process.memoryUsage().heapUsed - heap;
    microseconds = Math.min(microseconds, (1000 * time) / steps);
    // A collection in between makes the heap shrink; such a round says nothing about allocation.
    if (grown >= 0) bytes = Math.min(bytes, grown / steps);
  }
  return { microseconds, bytes };
}

/**
 * Times every rule on levels: one recommendation with trace after 30 cohorts, and one cohort without trace as the simulator
 * runs it. Prints a table and returns its rows.
 */
export function benchDesign(): DesignBenchRow[] {
  const rows = rules.map((rule) => {
    const design = benchedDesign(rule);
    const { median, p95 } = timeRecommendation(design);
    const { microseconds, bytes } = timeStep(compileDesign(design));
    return {
      rule: rule.name,
      recommendMedian: median,
      recommendP95: p95,
      stepMicroseconds: microseconds,
      bytesPerStep: bytes,
      withinLimit: median < RECOMMENDATION_LIMIT,
    };
  });
  console.log(
    `Recommendation with trace after ${COHORTS} cohorts (limit ${RECOMMENDATION_LIMIT} ms), and one cohort without trace`,
  );
  console.table(
    rows.map((row) => ({
      rule: row.rule,
      'recommend median ms': row.recommendMedian.toFixed(3),
      'recommend p95 ms': row.recommendP95.toFixed(3),
      'step µs': row.stepMicroseconds.toFixed(2),
      'bytes per step': row.bytesPerStep.toFixed(1),
      'within limit': row.withinLimit ? 'yes' : 'NO',
    })),
  );
  return rows;
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) benchDesign();
