import { afterAll, describe, expect, it } from 'vitest';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { doseSetOf, nearestIndex } from '../dose-set';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { runRule } from '@/tests/run-rule';

interface Inputs {
  scale: 'identity' | 'log';
  doses: number[];
  xstar1: number;
  responses: number[];
  cohort_size: number;
  Gamma: number;
  b: number;
}
interface Outputs {
  xstar: number[];
  level: number[];
  x_level: number[];
}

const settings = (slope: number, carryBounds: { lowest: number; highest: number } | null = null) =>
  ({ name: 'virtual-observations', slope, carryBounds }) as const;

function levelsOf(doses: number[], scale: 'linear' | 'log') {
  const { kind } = designDefaults('levels').doses;
  return doseSetOf({ kind: kind as 'levels', levels: doses.map(String) }, scale);
}

describe('virtual observations', () => {
  const deviations = new Deviations('Virtual observations (05)');
  afterAll(() => console.log(deviations.summary()));

  for (const { id, inputs, outputs, tolerance } of readReference<Inputs, Outputs>(
    '05_virtual_observation.json',
  )) {
    it(`agrees with base R: ${id}`, () => {
      const levels = levelsOf(inputs.doses, inputs.scale === 'log' ? 'log' : 'linear');
      const run = runRule(settings(inputs.b), {
        target: inputs.Gamma,
        x1: inputs.xstar1,
        responses: inputs.responses,
        sizes: inputs.cohort_size,
        given: (x) => levels.working(nearestIndex(levels, x, false)),
      });
      deviations.compare(run.x, outputs.xstar, tolerance, `${id} x*`);
      const indices = run.x.map((x) => nearestIndex(levels, x, false) + 1);
      expect(indices).toEqual(outputs.level);
      deviations.compare(run.given, outputs.x_level.slice(0, -1), tolerance, `${id} levels`);
    });
  }

  // FACTS A6, 8–10: check values computed for this project
  it('gives the check values with continuous outcomes', () => {
    const levels = levelsOf([1, 3, 6, 8, 10], 'linear');
    const run = runRule(settings(0.25), {
      target: 2,
      x1: 3,
      responses: [0.8, 1, 1.4, 1.5, 2.6, 1.9],
      sizes: 1,
      given: (x) => levels.working(nearestIndex(levels, x, false)),
    });
    const expected = [3, 7.8, 9.9, 10.733333, 11.05, 10.36, 10.366667];
    run.x.forEach((x, i) => expect(x).toBeCloseTo(expected[i] as number, 6));
    expect(run.given).toEqual([3, 8, 10, 10, 10, 10]);
  });

  it('gives the check values with cohorts of 3', () => {
    const levels = levelsOf([1, 2, 3, 4, 5], 'linear');
    const run = runRule(settings(0.125), {
      target: 0.25,
      x1: 2,
      responses: [0, 0, 1, 0, 2, 1],
      sizes: 3,
      given: (x) => levels.working(nearestIndex(levels, x, false)),
    });
    const expected = [2, 4, 5, 4.777778, 5.333333, 4.6, 4.555556];
    run.x.forEach((x, i) => expect(x).toBeCloseTo(expected[i] as number, 6));
  });

  it('takes up a deviation by itself: planned 20, given 18, next 23', () => {
    const run = runRule(settings(0.05), { target: 0.25, x1: 20, responses: [0], sizes: 1, given: () => 18 });
    expect(run.x[1]).toBeCloseTo(23, 12);
  });

  it('takes up a correction: the mean form of check value 11', () => {
    const given = [20, 25, 27.5, 22.5, 23.75, 24.75, 25.583333333333332, 23.44047619047619];
    const run = runRule(settings(0.05), {
      target: 0.25,
      x1: 20,
      responses: [0, 0, 0, 0, 0, 0, 1, 0],
      sizes: 1,
      given: (_x, cohort) => given[cohort - 1] as number,
    });
    // FACTS A6, 11: 26.565476
    expect(run.x[8]).toBeCloseTo(26.565476, 6);
  });

  it('follows the published recursion, with and without bounds on the carried value', () => {
    const [b, target] = [0.2, 0.3];
    const y = [0, 0, 1, 0, 1, 1];
    const given = [1, 2, 2, 1, 3, 2];
    for (const bounds of [null, { lowest: 1.5, highest: 2.5 }]) {
      let x = 1;
      const expected = [x];
      y.forEach((response, i) => {
        const virtual = response + b * (x - (given[i] as number));
        x -= (virtual - target) / ((i + 1) * b);
        if (bounds) x = Math.min(Math.max(x, bounds.lowest), bounds.highest);
        expected.push(x);
      });
      const run = runRule(settings(b, bounds), {
        target,
        x1: 1,
        responses: y,
        sizes: 1,
        given: (_x, cohort) => given[cohort - 1] as number,
      });
      run.x.forEach((value, i) => expect(value).toBeCloseTo(expected[i] as number, 12));
    }
  });
});
