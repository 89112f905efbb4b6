import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { logit, logNormalCdf, normalCdf, normalDensity } from '../distributions';
import { BinaryRegression } from './binary-regression';
import { fitLogistic } from './logistic';
import { fitProbit } from './probit';
import type { DoseRow } from './rows';

interface Fitted {
  intercept: number;
  slope: number;
  cov: number[][];
  information_inverse: number[][];
  loglik_kernel: number;
  penalised_loglik_kernel: number;
  quantile_estimate: number | null;
}

interface Inputs {
  x: number[];
  responses: number[];
  cohort_sizes: number[];
  Gamma: number;
}

interface Outputs {
  mle_status: string;
  mle: Fitted | null;
  firth: Fitted | null;
}

const ml = new Deviations('logit ML (reference 07)');
const firth = new Deviations('logit Firth (reference 07)');
afterAll(() => console.log(`${ml.summary()}\n${firth.summary()}`));

const rowsOf = ({ x, responses, cohort_sizes }: Inputs): DoseRow[] =>
  x.map((dose, i) => ({ x: dose, n: cohort_sizes[i] as number, y: responses[i] as number }));

describe('values of base R (reference 07)', () => {
  for (const c of readReference<Inputs, Outputs>('07_logit_mle_firth.json')) {
    it(c.id, () => {
      const result = fitLogistic(rowsOf(c.inputs));
      expect(result.status).toBe(c.outputs.mle_status);
      const quantile = (fit: { intercept: number; slope: number }) =>
        Math.abs(fit.slope) > 1e-8 ? (logit(c.inputs.Gamma) - fit.intercept) / fit.slope : null;
      const compare = (
        deviations: Deviations,
        got: ReturnType<typeof fitLogistic>,
        expected: Fitted | null,
        covariance: number[][] | undefined,
        logLikelihood: number | undefined,
      ) => {
        if (expected === null) {
          expect(got.outcome).toBe('no-maximum');
          return;
        }
        if (got.outcome !== 'fitted') throw new Error(`${c.id}: ${got.outcome}`);
        deviations.compare(got.fit.intercept, expected.intercept, c.tolerance, `${c.id} intercept`);
        deviations.compare(got.fit.slope, expected.slope, c.tolerance, `${c.id} slope`);
        deviations.compare(got.fit.covariance, covariance, c.tolerance, `${c.id} covariance`);
        deviations.compare(got.fit.logLikelihood, logLikelihood, c.tolerance, `${c.id} log-likelihood`);
        deviations.compare(quantile(got.fit), expected.quantile_estimate, c.tolerance, `${c.id} quantile`);
      };
      const { mle, firth: penalised } = c.outputs;
      compare(ml, result, mle, mle?.cov, mle?.loglik_kernel);
      compare(
        firth,
        fitLogistic(rowsOf(c.inputs), 'firth'),
        penalised,
        penalised?.information_inverse,
        penalised?.penalised_loglik_kernel,
      );
    });
  }
});

describe('status of a fit', () => {
  const rows = (...data: [number, number, number][]) => data.map(([x, n, y]) => ({ x, n, y }));
  it.each([
    ['no-data', rows()],
    ['all-nonresponse', rows([1, 3, 0])],
    ['all-response', rows([1, 3, 3], [2, 1, 1])],
    ['single-dose', rows([1, 3, 1], [1, 3, 2])],
    ['separated-increasing', rows([1, 3, 0], [2, 3, 3])],
    ['separated-decreasing', rows([1, 3, 3], [2, 3, 0])],
    ['quasi-separated-increasing', rows([1, 3, 0], [2, 3, 1], [3, 3, 3])],
    ['quasi-separated-increasing', rows([1, 3, 0], [2, 3, 1])],
    ['quasi-separated-decreasing', rows([1, 3, 3], [2, 3, 1], [3, 3, 0])],
    ['exists', rows([1, 3, 1], [2, 3, 1])],
  ])('%s', (status, data) => {
    const result = fitLogistic(data);
    expect(result.status).toBe(status);
    expect(result.outcome).toBe(status === 'exists' ? 'fitted' : 'no-maximum');
    expect(fitProbit(data).status).toBe(status);
  });

  it("Firth's fit lacks a maximum only without data or at a single dose", () => {
    expect(fitLogistic(rows([1, 3, 1], [1, 3, 2]), 'firth').outcome).toBe('no-maximum');
    expect(fitLogistic([], 'firth').outcome).toBe('no-maximum');
    expect(fitLogistic(rows([1, 3, 0], [2, 3, 0]), 'firth').outcome).toBe('fitted');
  });

  it('refuses rows that are no counts', () => {
    expect(() => fitLogistic(rows([1, 3, 4]))).toThrow(RangeError);
    expect(() => fitLogistic(rows([NaN, 3, 1]))).toThrow(RangeError);
    expect(() => new BinaryRegression('logit', 1).add(1, -1, 0)).toThrow(RangeError);
    const full = new BinaryRegression('logit', 1);
    full.add(1, 2, 1);
    full.add(1, 2, 0);
    expect(() => full.add(2, 1, 0)).toThrow(RangeError);
  });
});

describe('values computed in Python, confirmed in base R', () => {
  it('doses 1 to 4, three subjects each, 0, 1, 1, 2 responses', () => {
    const result = fitLogistic([0, 1, 1, 2].map((y, i) => ({ x: i + 1, n: 3, y })));
    if (result.outcome !== 'fitted') throw new Error(result.outcome);
    expect(result.fit.intercept).toBeCloseTo(-3.6217677, 6);
    expect(result.fit.slope).toBeCloseTo(1.0793238, 6);
    expect(result.fit.logLikelihood).toBeCloseTo(-6.167037, 5);
  });
});

const dataSets = fc
  .array(
    fc.record({
      x: fc.double({ min: -5, max: 5, noNaN: true }),
      n: fc.integer({ min: 1, max: 12 }),
      share: fc.nat(12),
    }),
    {
      minLength: 2,
      maxLength: 8,
    },
  )
  .map((list) =>
    list.map(({ x, n, share }) => ({ x: Math.round(x * 8) / 8, n, y: Math.round((n * share) / 12) })),
  );

describe('properties', () => {
  const links = ['logit', 'probit'] as const;
  for (const link of links) {
    const fit = link === 'logit' ? fitLogistic : fitProbit;

    it(`${link}: every fit that has a maximum settles, and no point near it is more likely`, () => {
      check(
        fc.property(
          dataSets,
          fc.constantFrom('maximum-likelihood' as const, 'firth' as const),
          (rows, method) => {
            const result = fit(rows, method);
            if (result.outcome === 'no-maximum') {
              if (method === 'firth') expect(new Set(rows.map((row) => row.x)).size).toBe(1);
              return;
            }
            if (result.outcome !== 'fitted') throw new Error(JSON.stringify(result));
            const best = objective(link, rows, result.fit.intercept, result.fit.slope, method === 'firth');
            expect(Math.abs(best - result.fit.logLikelihood)).toBeLessThan(1e-8 * (1 + Math.abs(best)));
            const [[v00], [, v11]] = result.fit.covariance;
            for (const [da, db] of [
              [1, 0],
              [-1, 0],
              [0, 1],
              [0, -1],
            ] as const) {
              const a = result.fit.intercept + da * 1e-3 * Math.sqrt(v00);
              const b = result.fit.slope + db * 1e-3 * Math.sqrt(v11);
              expect(objective(link, rows, a, b, method === 'firth')).toBeLessThanOrEqual(
                best + 1e-10 * (1 + Math.abs(best)),
              );
            }
          },
        ),
      );
    });

    it(`${link}: mirrored doses mirror the slope; grouping and order of rows do not matter`, () => {
      check(
        fc.property(
          dataSets,
          fc.constantFrom('maximum-likelihood' as const, 'firth' as const),
          (rows, method) => {
            const a = fit(rows, method);
            const b = fit(
              rows.map((row) => ({ ...row, x: -row.x })),
              method,
            );
            const single = rows.flatMap((row) =>
              Array.from({ length: row.n }, (_, i) => ({ x: row.x, n: 1, y: i < row.y ? 1 : 0 })),
            );
            const c = fit(single.reverse(), method);
            expect(b.outcome).toBe(a.outcome);
            if (a.outcome !== 'fitted' || b.outcome !== 'fitted' || c.outcome !== 'fitted') return;
            const close = (got: number, expected: number) =>
              expect(Math.abs(got - expected)).toBeLessThan(1e-6 * (1 + Math.abs(expected)));
            close(b.fit.slope, -a.fit.slope);
            close(b.fit.intercept, a.fit.intercept);
            close(c.fit.slope, a.fit.slope);
          },
        ),
      );
    });
  }

  it("Firth's logit at two doses is logit((y + ½)/(n + 1)) at each (closed form)", () => {
    check(
      fc.property(
        fc.nat(9),
        fc.nat(9),
        fc.integer({ min: 1, max: 9 }),
        fc.integer({ min: 1, max: 9 }),
        (a, b, n, m) => {
          const rows = [
            { x: 1.5, n, y: Math.min(a, n) },
            { x: 4, n: m, y: Math.min(b, m) },
          ] as const;
          const result = fitLogistic(rows, 'firth');
          if (result.outcome !== 'fitted') throw new Error(result.outcome);
          for (const row of rows) {
            expect(result.fit.intercept + result.fit.slope * row.x).toBeCloseTo(
              Math.log((row.y + 0.5) / (row.n - row.y + 0.5)),
              8,
            );
          }
        },
      ),
    );
  });
});

/** Penalised or plain log-likelihood written out afresh, plain sums of logs. */
function objective(
  link: 'logit' | 'probit',
  rows: readonly DoseRow[],
  a: number,
  b: number,
  penalised: boolean,
): number {
  const regression = new BinaryRegression(link, rows.length);
  for (const row of rows) regression.add(row.x, row.n, row.y);
  let sum = 0;
  let w0 = 0;
  let w1 = 0;
  let w2 = 0;
  for (let i = 0; i < regression.count; i++) {
    const x = regression.x[i] as number;
    const n = regression.n[i] as number;
    const y = regression.y[i] as number;
    const eta = a + b * x;
    const { logP, logQ, weight } = pointwise(link, eta);
    sum += (y > 0 ? y * logP : 0) + (n > y ? (n - y) * logQ : 0);
    w0 += n * weight;
    w1 += n * weight * x;
    w2 += n * weight * x * x;
  }
  return sum + (penalised ? 0.5 * Math.log(w0 * w2 - w1 * w1) : 0);
}

function pointwise(link: 'logit' | 'probit', eta: number) {
  if (link === 'logit') {
    const p = 1 / (1 + Math.exp(-eta));
    const q = 1 / (1 + Math.exp(eta));
    return { logP: Math.log(p), logQ: Math.log(q), weight: p * q };
  }
  const p = normalCdf(eta);
  const q = normalCdf(-eta);
  return {
    logP: logNormalCdf(eta),
    logQ: logNormalCdf(-eta),
    weight: p > 0 && q > 0 ? normalDensity(eta) ** 2 / (p * q) : 0,
  };
}
