import { afterAll, describe, expect, it } from 'vitest';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { runRule } from '@/tests/run-rule';
import { ADAPTIVE } from './adaptive-slope';

interface Inputs {
  form: 'last' | 'mean';
  weighted_by_cohort_size: boolean;
  x1: number;
  responses: number[];
  cohort_sizes: number[];
  Gamma: number;
  b0: number;
  bmin: number;
  bmax: number;
  xmin: number;
  xmax: number;
}
interface Outputs {
  slope_ls: (number | null)[];
  slope_used: number[];
  x: number[];
}

const settings = (form: 'last' | 'mean', b0: number, low: number, high: number, weighted = false) =>
  ({
    name: 'adaptive-slope',
    form,
    initialSlope: b0,
    slopeLow: low,
    slopeHigh: high,
    weighted,
    carry: 'iterate',
    carryReason: null,
  }) as const;

describe('adaptive slope', () => {
  const deviations = new Deviations('Adaptive slope (06)');
  afterAll(() => console.log(deviations.summary()));

  for (const { id, inputs, outputs, tolerance } of readReference<Inputs, Outputs>('06_adaptive_slope.json')) {
    it(`agrees with base R: ${id}`, () => {
      const run = runRule(
        settings(inputs.form, inputs.b0, inputs.bmin, inputs.bmax, inputs.weighted_by_cohort_size),
        {
          target: inputs.Gamma,
          x1: inputs.x1,
          responses: inputs.responses,
          sizes: inputs.cohort_sizes,
          lowest: inputs.xmin,
          highest: inputs.xmax,
        },
      );
      const fitted = run.registers.map((r) => {
        const slope = r[ADAPTIVE.FITTED] as number;
        return Number.isNaN(slope) ? null : slope;
      });
      deviations.compare(fitted, outputs.slope_ls, tolerance, `${id} slope`);
      const used = run.registers.map((r) => r[ADAPTIVE.USED]);
      deviations.compare(used, outputs.slope_used, tolerance, `${id} slope used`);
      deviations.compare(run.x, outputs.x, tolerance, `${id} x`);
    });
  }

  it('gives the check values with continuous outcomes (FACTS A6, 6)', () => {
    const run = runRule(settings('last', 1, 0.5, 2), {
      target: 2,
      x1: 0,
      responses: [0.5, 1.6, 2.3, 1.9, 2.2, 1.8],
      sizes: 1,
    });
    const x = [0, 1.5, 1.772727, 1.66408, 1.691832, 1.649081, 1.685624];
    const slopes = [1, 0.733333, 0.920408, 0.90083, 0.93566, 0.912169];
    run.x.forEach((value, i) => expect(value).toBeCloseTo(x[i] as number, 6));
    run.registers.forEach((r, i) => expect(r[ADAPTIVE.USED]).toBeCloseTo(slopes[i] as number, 6));
  });
});
