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

  // FACTS A6, 16: exact characteristics computed for this project; virtual observations, m = 3, 8 cohorts, target 0.25
  const virtual = (slope: number, noSkipping: 'off' | 'tried', coherence: 'off' | 'one-way' = 'off') => {
    const base = designDefaults('levels');
    return designSchema.parse({
      ...base,
      scale: 'linear',
      doses: { kind: 'levels', levels: ['1', '2', '3', '4', '5'] },
      startingDose: '1',
      maximumCohorts: 8,
      rule: { name: 'virtual-observations', slope },
      guardrails: { ...base.guardrails, largestRise: null, noSkipping, coherence, closing: null },
      stopping: NO_STOPPING,
    });
  };
  const truth = [0.05, 0.1, 0.2, 0.3, 0.5];
  const harmful = [0.25, 0.4, 0.5, 0.6, 0.7];
  const mild = [0.02, 0.04, 0.08, 0.15, 0.25];

  it.each<[string, number, 'off' | 'tried', number[], number[], number[] | null, number | null]>([
    [
      'b = 1/8, no cap',
      1 / 8,
      'off',
      truth,
      [0.00655, 0.13767, 0.48546, 0.33822, 0.03211],
      [4.2152, 3.3308, 9.5499, 5.7882, 1.116],
      4.7483,
    ],
    [
      'b = 1/8, no skipping',
      1 / 8,
      'tried',
      truth,
      [0.00605, 0.13899, 0.48894, 0.34211, 0.0239],
      [3.9678, 6.2797, 8.4551, 4.9156, 0.3818],
      4.1829,
    ],
    [
      'b = 1/10, no skipping',
      1 / 10,
      'tried',
      truth,
      [0.00591, 0.12122, 0.43223, 0.3944, 0.04624],
      [3.9786, 5.7577, 7.9831, 5.1593, 1.1213],
      4.4798,
    ],
    [
      'b = 1/5',
      1 / 5,
      'tried',
      truth,
      [0.011, 0.26616, 0.62827, 0.09457, 0],
      [4.5328, 7.8126, 10.8862, 0.7684, 0],
      3.4157,
    ],
    ['b = 1/5, no cap', 1 / 5, 'off', truth, [0.011, 0.26616, 0.62827, 0.09457, 0], null, 3.4157],
    [
      'harmful truth',
      1 / 8,
      'tried',
      harmful,
      [0.80383, 0.17961, 0.01603, 0.00054, 0],
      [17.2866, 5.6746, 0.9589, 0.0797, 0.0003],
      7.1189,
    ],
    ['mild truth', 1 / 8, 'tried', mild, [0.00006, 0.00571, 0.10899, 0.52165, 0.36359], null, 2.6794],
  ])('gives the check values: %s', (_name, slope, noSkipping, p, selected, subjects, responses) => {
    const exact = enumerateTrial(virtual(slope, noSkipping), p);
    selected.forEach((share, j) => expect(exact.recommended[j + 1]).toBeCloseTo(share, 5));
    subjects?.forEach((n, j) => expect(exact.subjectsByLevel[j]).toBeCloseTo(n, 3));
    const expected = exact.responsesByLevel.reduce((sum, y) => sum + y, 0);
    if (responses !== null) expect(expected).toBeCloseTo(responses, 3);
  });

  it('never selects the top level with b = 1/5 even where it is the right one', () => {
    expect(enumerateTrial(virtual(1 / 5, 'tried'), mild).recommended[5]).toBe(0);
  });

  it.each([truth, harmful, mild])('is not changed by coherence, as the check values say: %s', (...p) => {
    for (const slope of [1 / 5, 1 / 8, 1 / 10]) {
      const off = enumerateTrial(virtual(slope, 'tried'), p);
      const on = enumerateTrial(virtual(slope, 'tried', 'one-way'), p);
      expect(on.recommended).toEqual(off.recommended);
    }
  });
});
