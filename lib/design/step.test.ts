import { afterAll, describe, expect, it } from 'vitest';
import { designSchema, type Design, type DesignInput } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { enumerateTrial } from '@/tests/enumerate-trial';
import { Deviations, readReference } from '@/tests/reference/read-reference';

interface Inputs {
  scale: 'identity' | 'log';
  doses: number[];
  p: number[];
  Gamma: number;
  cohort_size: number;
  cohorts: number;
  start_level: number;
  feedback: 'latent' | 'level' | 'virtual';
  c?: number;
  k0?: number;
  g?: number;
  b?: number;
  max_up: number;
  xmin: number;
  xmax: number;
  no_skip: 'current' | 'tried' | 'none';
  coherent: boolean;
  safety: { a: number; b: number; cutoff: number } | null;
}
interface Outputs {
  prob_recommended: number[];
  prob_recommended_by_average: number[];
  responses_distribution: number[];
  expected_n_per_level: number[];
  expected_responses_per_level: number[];
  expected_n: number;
  expected_responses: number;
  prob_stopped: number;
  mean_final_x_if_completed: number;
  leaves: number;
}

const NO_STOPPING = { maximumSubjects: null, repeated: null, precision: null };

function designOf(inputs: Inputs): Design {
  const base = designDefaults('levels');
  const bounds = { lowest: inputs.xmin, highest: inputs.xmax };
  const input: DesignInput = {
    ...base,
    target: inputs.Gamma,
    doses: { kind: 'levels', levels: inputs.doses.map(String) },
    scale: inputs.scale === 'log' ? 'log' : 'linear',
    startingDose: String(inputs.doses[inputs.start_level - 1]),
    cohortSize: inputs.cohort_size,
    maximumCohorts: inputs.cohorts,
    evaluableForRise: inputs.cohort_size,
    rule:
      inputs.feedback === 'virtual'
        ? { name: 'virtual-observations', slope: inputs.b as number, carryBounds: bounds }
        : {
            name: 'robbins-monro',
            c: inputs.c as number,
            k0: inputs.k0 as number,
            gamma: inputs.g as number,
            carry: inputs.feedback === 'level' ? 'given' : 'iterate',
            carryReason: inputs.feedback === 'level' ? 'as in the reference' : null,
          },
    guardrails: {
      largestRise: inputs.max_up === Infinity ? null : { kind: 'step', step: inputs.max_up },
      projection: bounds,
      ties: 'lower',
      noSkipping: inputs.no_skip === 'none' ? 'off' : inputs.no_skip,
      coherence: inputs.coherent ? 'one-way' : 'off',
      closing:
        inputs.safety === null
          ? null
          : {
              priorA: inputs.safety.a,
              priorB: inputs.safety.b,
              cutoff: inputs.safety.cutoff,
              minimumEvaluable: 1,
              scope: 'lowest-level',
            },
    },
    stopping: NO_STOPPING,
  };
  return designSchema.parse(input);
}

describe('exact enumeration through the step', () => {
  const deviations = new Deviations('Exact trials (13)');
  afterAll(() => console.log(deviations.summary()));

  for (const { id, inputs, outputs, tolerance } of readReference<Inputs, Outputs>('13_exact_trial.json')) {
    it(`agrees with base R: ${id}`, () => {
      const exact = enumerateTrial(designOf(inputs), inputs.p);
      const compare = (got: unknown, expected: unknown, what: string) =>
        deviations.compare(got, expected, tolerance, `${id} ${what}`);
      expect(exact.leaves).toBe(outputs.leaves);
      compare(exact.recommended, outputs.prob_recommended, 'recommended');
      compare(exact.recommendedByAverage, outputs.prob_recommended_by_average, 'by average');
      compare(exact.responses, outputs.responses_distribution, 'responses');
      compare(exact.subjectsByLevel, outputs.expected_n_per_level, 'n per level');
      compare(exact.responsesByLevel, outputs.expected_responses_per_level, 'responses per level');
      compare(exact.expectedSubjects, outputs.expected_n, 'expected n');
      compare(exact.meanFinal, outputs.mean_final_x_if_completed, 'mean final x');
    });
  }

  // FACTS A6, 16: exact characteristics computed for this project, virtual observations, m = 3, 8 cohorts, target 0.25
  const truth = [0.05, 0.1, 0.2, 0.3, 0.5];
  it.each([
    ['b = 1/8, no cap', 1 / 8, 'off', truth, [0.00655, 0.13767, 0.48546, 0.33822, 0.03211]],
    ['b = 1/8, no skipping', 1 / 8, 'tried', truth, [0.00605, 0.13899, 0.48894, 0.34211, 0.0239]],
    ['b = 1/10, no skipping', 1 / 10, 'tried', truth, [0.00591, 0.12122, 0.43223, 0.3944, 0.04624]],
    ['b = 1/5', 1 / 5, 'tried', truth, [0.011, 0.26616, 0.62827, 0.09457, 0]],
    ['harmful truth', 1 / 8, 'tried', [0.25, 0.4, 0.5, 0.6, 0.7], [0.80383, 0.17961, 0.01603, 0.00054, 0]],
  ] as const)('gives the check values: %s', (_name, slope, noSkipping, p, expected) => {
    const base = designDefaults('levels');
    const design = designSchema.parse({
      ...base,
      scale: 'linear',
      doses: { kind: 'levels', levels: ['1', '2', '3', '4', '5'] },
      startingDose: '1',
      maximumCohorts: 8,
      rule: { name: 'virtual-observations', slope },
      guardrails: { ...base.guardrails, largestRise: null, noSkipping, coherence: 'off', closing: null },
      stopping: NO_STOPPING,
    });
    // "no skipping" of the check values is from the highest level tried
    const exact = enumerateTrial(design, p);
    expected.forEach((share, j) => expect(exact.recommended[j + 1]).toBeCloseTo(share, 5));
  });
});
