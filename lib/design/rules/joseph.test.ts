import { afterAll, describe, expect, it } from 'vitest';
import { gaussLegendreRule, integrate } from '../distributions/gauss-legendre';
import { normalCdf, normalDensity, normalQuantile } from '../distributions/normal';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { runRule } from '@/tests/run-rule';
import { RULE } from '../trial-state';
import { JOSEPH } from './joseph';

interface Constants {
  kind: 'constants';
  alpha: number;
  beta: number;
  tau2: number;
  cohort_size: number;
}
interface Path {
  kind: 'path';
  x1: number;
  responses: number[];
  cohort_size: number;
  alpha: number;
  beta: number;
  tau2_1: number;
  xmin: number;
  xmax: number;
}

const settings = (slope: number, priorSd: number) => ({ name: 'joseph', slope, priorSd }) as const;

describe('Joseph', () => {
  const deviations = new Deviations('Joseph (04)');
  afterAll(() => console.log(deviations.summary()));

  for (const { id, inputs, outputs, tolerance } of readReference<
    Constants | Path,
    Record<string, number | number[]>
  >('04_joseph.json')) {
    if (inputs.kind === 'constants') {
      it(`agrees with base R on the constants: ${id}`, () => {
        const run = runRule(settings(inputs.beta, Math.sqrt(inputs.tau2)), {
          target: inputs.alpha,
          x1: 0,
          responses: [0],
          sizes: inputs.cohort_size,
        });
        const r = run.registers[0] as Float64Array;
        deviations.compare(r[JOSEPH.EXPECTED], outputs.b, tolerance, `${id} b`);
        deviations.compare(r[RULE.GAIN], outputs.a, tolerance, `${id} a`);
        deviations.compare(r[JOSEPH.COVARIANCE], outputs.cov_Z_ybar, tolerance, `${id} C`);
        deviations.compare(r[JOSEPH.VARIANCE], outputs.var_ybar, tolerance, `${id} V`);
        deviations.compare(r[JOSEPH.TAU2], outputs.tau2_next, tolerance, `${id} tau2`);
      });
    } else {
      it(`agrees with base R on the path: ${id}`, () => {
        const run = runRule(settings(inputs.beta, Math.sqrt(inputs.tau2_1)), {
          target: inputs.alpha,
          x1: inputs.x1,
          responses: inputs.responses,
          sizes: inputs.cohort_size,
          lowest: inputs.xmin,
          highest: inputs.xmax,
        });
        const column = (register: number) => run.registers.map((r) => r[register]);
        deviations.compare(column(RULE.GAIN), outputs.a, tolerance, `${id} a`);
        deviations.compare(column(JOSEPH.EXPECTED), outputs.b, tolerance, `${id} b`);
        deviations.compare([inputs.tau2_1, ...column(JOSEPH.TAU2)], outputs.tau2, tolerance, `${id} tau2`);
        deviations.compare(run.x, outputs.x, tolerance, `${id} x`);
      });
    }
  }

  // FACTS A6, 14: gains computed for this project from the published formulas, m = 1
  it.each([
    [0.5, 1, 1, 1, [1.128379, 0.5, 1]],
    [0.5, 1, 1, 2, [0.83885, 0.5, 0.825645]],
    [0.5, 1, 1, 5, [0.451289, 0.5, 0.570618]],
    [0.5, 1, 1, 10, [0.24647, 0.5, 0.40846]],
    [0.5, 1, 1, 20, [0.126795, 0.5, 0.287535]],
    [0.25, 1, 1, 1, [1.163426, 0.316704, 1]],
    [0.25, 1, 1, 2, [0.895026, 0.302845, 0.840884]],
    [0.25, 1, 1, 5, [0.511504, 0.281296, 0.59755]],
    [0.25, 1, 1, 10, [0.290968, 0.268098, 0.434686]],
    [0.25, 1, 1, 20, [0.153869, 0.259653, 0.309048]],
    [0.9, 1, 1, 1, [1.254527, 0.817583, 1]],
    [0.9, 1, 1, 2, [1.035471, 0.832618, 0.874801]],
    [0.9, 1, 1, 5, [0.675195, 0.857268, 0.662989]],
    [0.9, 1, 1, 10, [0.425504, 0.873824, 0.503483]],
    [0.9, 1, 1, 20, [0.244045, 0.88536, 0.36924]],
    [0.9, 1, 2, 1, [2.982585, 0.716721, 2]],
    [0.9, 1, 2, 2, [2.096327, 0.763343, 1.48117]],
    [0.9, 1, 2, 10, [0.546436, 0.865888, 0.582951]],
    [0.3, 0.5, 2, 1, [2.299139, 0.355391, 2]],
    [0.3, 0.5, 2, 2, [1.745921, 0.34365, 1.670039]],
    [0.3, 0.5, 2, 10, [0.545711, 0.314638, 0.848557]],
    [0.99, 1, 1, 1, [1.535383, 0.950013, 1]],
    [0.99, 1, 1, 10, [0.942533, 0.971767, 0.698209]],
    [0.99, 1, 1, 50, [0.402671, 0.98421, 0.413656]],
  ])('gives the check values: target %d, slope %d, prior sd %d, n = %d', (target, slope, sd, n, expected) => {
    const run = runRule(settings(slope, sd), {
      target,
      x1: 0,
      responses: Array<number>(n).fill(0),
      sizes: 1,
    });
    const r = run.registers[n - 1] as Float64Array;
    expect(r[RULE.GAIN]).toBeCloseTo(expected[0] as number, 6);
    expect(r[JOSEPH.EXPECTED]).toBeCloseTo(expected[1] as number, 6);
    expect(Math.sqrt(r[JOSEPH.TAU2_BEFORE] as number)).toBeCloseTo(expected[2] as number, 6);
  });

  it.each([1, 2, 4, 8])('has a = Cov/Var and b the mean, by quadrature, cohorts of %d', (m) => {
    const [target, slope, sd] = [0.3, 0.9, 1.3];
    const q = normalQuantile(target);
    const nodes = gaussLegendreRule(64);
    const mean = (f: (z: number) => number) => {
      let sum = 0;
      for (let i = -10; i < 10; i += 1) {
        sum += integrate((u) => f(u * sd) * normalDensity(u), i, i + 1, nodes);
      }
      return sum;
    };
    const curve = (z: number) => normalCdf(q + slope * z);
    const b = mean(curve);
    const covariance = mean((z) => z * curve(z));
    const second = mean((z) => curve(z) ** 2);
    const variance = second - b * b + (b - second) / m;
    const run = runRule(settings(slope, sd), { target, x1: 0, responses: [0], sizes: m });
    const r = run.registers[0] as Float64Array;
    expect(r[JOSEPH.EXPECTED]).toBeCloseTo(b, 12);
    expect(r[RULE.GAIN]).toBeCloseTo(covariance / variance, 10);
  });
});
