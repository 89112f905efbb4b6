import { afterAll, describe, expect, it } from 'vitest';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { runRule } from '@/tests/run-rule';
import { RULE } from '../trial-state';
import { FIT_METHOD, LOGIT } from './logit-ml';

interface Inputs {
  x: number[];
  responses: number[];
  cohort_sizes: number[];
  Gamma: number;
  max_step: number;
  xmin: number;
  xmax: number;
}
interface Fit {
  intercept: number;
  slope: number;
  quantile_estimate: number | null;
  next_x: number | null;
}
interface Outputs {
  mle_status: string;
  mle: Fit | null;
  firth: Fit | null;
}

const settings = (largestMove: number, firth = true, c = 1) =>
  ({ name: 'logit-ml', firth, c, largestMove }) as const;

describe('logit maximum likelihood', () => {
  const deviations = new Deviations('Logit ML and Firth as a rule (07)');
  afterAll(() => console.log(deviations.summary()));

  for (const { id, inputs, outputs, tolerance } of readReference<Inputs, Outputs>(
    '07_logit_mle_firth.json',
  )) {
    const usable = (fit: Fit | null) => fit !== null && fit.slope > 1e-8;
    const expected = usable(outputs.mle) ? outputs.mle : usable(outputs.firth) ? outputs.firth : null;
    it(`agrees with base R: ${id}`, () => {
      const run = runRule(settings(inputs.max_step), {
        target: inputs.Gamma,
        x1: inputs.x[0] as number,
        responses: inputs.responses,
        sizes: inputs.cohort_sizes,
        lowest: inputs.xmin,
        highest: inputs.xmax,
        given: (_x, cohort) => inputs.x[cohort - 1] as number,
      });
      const r = run.registers[run.registers.length - 1] as Float64Array;
      const next = run.x[run.x.length - 1];
      if (expected === null) {
        // no usable slope: x̃_k − (c/k) e_k, by hand
        const k = inputs.x.length;
        const e = (inputs.responses[k - 1] as number) / (inputs.cohort_sizes[k - 1] as number) - inputs.Gamma;
        expect(r[LOGIT.METHOD]).toBe(FIT_METHOD.fallback);
        expect(next).toBeCloseTo((inputs.x[k - 1] as number) - (1 / k) * e, 12);
        return;
      }
      expect(r[LOGIT.METHOD]).toBe(
        expected === outputs.mle ? FIT_METHOD.maximumLikelihood : FIT_METHOD.firth,
      );
      deviations.compare(r[LOGIT.INTERCEPT], expected.intercept, tolerance, `${id} intercept`);
      deviations.compare(r[LOGIT.SLOPE], expected.slope, tolerance, `${id} slope`);
      deviations.compare(r[LOGIT.UNLIMITED], expected.quantile_estimate, tolerance, `${id} quantile`);
      deviations.compare(next, expected.next_x, tolerance, `${id} next x`);
    });
  }

  it('gives the mirrored value where the response falls with dose', () => {
    const run = { target: 0.3, x1: 1, responses: [0, 1, 2, 1, 2, 2], sizes: 3 };
    const given = [0.5, 1, 2, 1.5, 2, 3];
    const rising = runRule(settings(5), { ...run, given: (_x, k) => given[k - 1] as number });
    const falling = runRule(settings(5), { ...run, sign: -1, given: (_x, k) => -(given[k - 1] as number) });
    rising.registers.forEach((r, i) =>
      expect(falling.registers[i]?.[RULE.NEXT]).toBeCloseTo(r[RULE.NEXT] as number, 10),
    );
  });
});
