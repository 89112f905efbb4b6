import { afterAll, describe, expect, it } from 'vitest';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { normalQuantile } from '../distributions';
import type { Link } from './binary-regression';
import { fitBinary } from './fit';
import { fitLogistic } from './logistic';
import { fiellerSet, quantileEstimate, type FittedLine } from './quantile';

interface Inputs {
  x?: number[];
  responses?: number[];
  n?: number[];
  intercept?: number;
  slope?: number;
  cov?: [[number, number], [number, number]];
  link: Link;
  p: number[];
  level: number;
}

interface Outputs {
  intercept?: number;
  slope?: number;
  cov?: number[][];
  deviance?: number;
  quantiles: {
    p: number;
    estimate: number;
    se: number;
    delta_lower: number;
    delta_upper: number;
    fieller_g: number;
    fieller: { type: string; lower: number; upper: number };
  }[];
  published?: {
    intercept?: number;
    slope?: number;
    deviance?: number;
    estimate?: number[];
    se?: number[];
  } | null;
}

const quantiles = new Deviations('quantiles, delta and Fieller (reference 09c)');
const fits = new Deviations('logit and probit fits of beetle and budworm data (reference 09c)');
afterAll(() => console.log(`${quantiles.summary()}\n${fits.summary()}`));

/** Residual deviance against the saturated model. */
function deviance(rows: { x: number; n: number; y: number }[], logLikelihood: number): number {
  const term = (count: number, share: number) => (count > 0 ? count * Math.log(share) : 0);
  const saturated = rows.reduce((sum, { n, y }) => sum + term(y, y / n) + term(n - y, (n - y) / n), 0);
  return 2 * (saturated - logLikelihood);
}

describe('values of base R (reference 09c)', () => {
  for (const c of readReference<Inputs, Outputs>('09c_ed_quantiles.json')) {
    it(c.id, () => {
      const { inputs, outputs, tolerance } = c;
      let line: FittedLine;
      if (inputs.x) {
        const rows = inputs.x.map((x, i) => ({
          x,
          n: inputs.n?.[i] as number,
          y: inputs.responses?.[i] as number,
        }));
        const result = fitBinary(inputs.link, rows, 'maximum-likelihood');
        if (result.outcome !== 'fitted') throw new Error(result.outcome);
        line = result.fit;
        fits.compare(line.intercept, outputs.intercept, tolerance, `${c.id} intercept`);
        fits.compare(line.slope, outputs.slope, tolerance, `${c.id} slope`);
        fits.compare(line.covariance, outputs.cov, tolerance, `${c.id} covariance`);
        fits.compare(
          deviance(rows, result.fit.logLikelihood),
          outputs.deviance,
          tolerance,
          `${c.id} deviance`,
        );
        // Dobson's textbook values, two decimals, as quoted from memory in the reference file.
        const { published } = outputs;
        if (published?.intercept !== undefined) {
          expect(line.intercept).toBeCloseTo(published.intercept, 2);
          expect(line.slope).toBeCloseTo(published.slope as number, 2);
          expect(outputs.deviance).toBeCloseTo(published.deviance as number, 2);
        }
      } else {
        const { link, intercept, slope, cov } = inputs as Required<Inputs>;
        line = { link, intercept, slope, covariance: cov };
      }
      outputs.quantiles.forEach((expected, i) => {
        const got = quantileEstimate(line, expected.p, inputs.level);
        if (got === null) throw new Error('no quantile');
        const at = `${c.id} p=${expected.p}`;
        quantiles.compare(got.estimate, expected.estimate, tolerance, at);
        quantiles.compare(got.standardError, expected.se, tolerance, `${at} standard error`);
        quantiles.compare(
          [got.delta.lower, got.delta.upper],
          [expected.delta_lower, expected.delta_upper],
          tolerance,
          `${at} delta`,
        );
        quantiles.compare(got.fiellerG, expected.fieller_g, tolerance, `${at} g`);
        expect(got.fieller.type).toBe(expected.fieller.type);
        quantiles.compare(
          [got.fieller.lower, got.fieller.upper],
          [expected.fieller.lower, expected.fieller.upper],
          tolerance,
          `${at} Fieller`,
        );
        // Venables & Ripley's dose.p example, as quoted from memory in the reference file.
        const { published } = outputs;
        if (published?.estimate) {
          expect(got.estimate).toBeCloseTo(published.estimate[i] as number, 5);
          expect(got.standardError).toBeCloseTo(published.se?.[i] as number, 6);
        }
      });
    });
  }
});

describe('quantiles and standard errors computed in Python, confirmed in base R', () => {
  it('ED25, ED30, ED50, ED90', () => {
    const result = fitLogistic([0, 1, 1, 2].map((y, i) => ({ x: i + 1, n: 3, y })));
    if (result.outcome !== 'fitted') throw new Error(result.outcome);
    const at = (p: number) => quantileEstimate(result.fit, p, 0.95);
    expect(at(0.25)?.estimate).toBeCloseTo(2.337719, 6);
    expect(at(0.25)?.standardError).toBeCloseTo(0.749801, 6);
    expect(at(0.3)?.estimate).toBeCloseTo(2.570563, 6);
    expect(at(0.5)?.estimate).toBeCloseTo(3.35559, 5);
    expect(at(0.5)?.standardError).toBeCloseTo(0.714302, 6);
    expect(at(0.9)?.estimate).toBeCloseTo(5.391331, 6);
  });
});

describe("Fieller's set in all its shapes", () => {
  const line = (slope: number, covariance: [[number, number], [number, number]]): FittedLine => ({
    link: 'logit',
    intercept: -1,
    slope,
    covariance,
  });
  const z = normalQuantile(0.975);
  /** The inequality that defines the set, evaluated afresh. */
  const holds = (fitted: FittedLine, eta: number, x: number) => {
    const [[a, b], [, c]] = fitted.covariance;
    return (fitted.intercept + fitted.slope * x - eta) ** 2 <= z * z * (a + 2 * b * x + c * x * x);
  };
  const inSet = (set: ReturnType<typeof fiellerSet>, x: number) => {
    const inside = x >= set.lower && x <= set.upper;
    return set.type === 'complement-of-open-interval' ? x <= set.lower || x >= set.upper : inside;
  };
  // The target is far from the data in the complement case and near it in the whole-line case.
  const cases: [string, FittedLine, number][] = [
    [
      'bounded',
      line(1, [
        [0.3, -0.05],
        [-0.05, 0.02],
      ]),
      0.5,
    ],
    [
      'complement-of-open-interval',
      line(0.2, [
        [0.3, -0.05],
        [-0.05, 0.02],
      ]),
      3,
    ],
    [
      'whole-line',
      line(0.2, [
        [0.3, -0.05],
        [-0.05, 0.02],
      ]),
      0,
    ],
  ];
  it.each(cases)('%s', (type, fitted, eta) => {
    const set = fiellerSet(fitted, eta, z);
    expect(set.type).toBe(type);
    const points = Array.from({ length: 4001 }, (_, i) => (i - 2000) / 20);
    expect(points.filter((x) => holds(fitted, eta, x) !== inSet(set, x))).toEqual([]);
    // The point estimate always belongs to the set.
    expect(inSet(set, (eta - fitted.intercept) / fitted.slope)).toBe(true);
  });

  it('half-line, where the slope is exactly z standard errors from zero', () => {
    const fitted = line(z, [
      [0.3, -0.1],
      [-0.1, 1],
    ]);
    const set = fiellerSet(fitted, 0.5, z);
    expect(set.type).toBe('half-line');
    for (const x of [set.lower - 0.01, set.lower + 0.01]) expect(inSet(set, x)).toBe(holds(fitted, 0.5, x));
    for (const x of [-50, 50]) expect(inSet(set, x)).toBe(holds(fitted, 0.5, x));
  });

  it('is none when the slope is flat or runs the other way', () => {
    const fitted = line(-1, [
      [0.3, -0.05],
      [-0.05, 0.02],
    ]);
    expect(quantileEstimate(fitted, 0.3, 0.95)).toBeNull();
    expect(quantileEstimate(fitted, 0.3, 0.95, -1)?.estimate).toBeCloseTo(Math.log(7 / 3) - 1, 12);
    expect(
      quantileEstimate(
        line(1e-8, [
          [1, 0],
          [0, 1],
        ]),
        0.3,
        0.95,
      ),
    ).toBeNull();
  });
});
