import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { bootstrapInterval, sampleQuantile } from './bootstrap';
import { centredIsotonicFit, isotonicEstimate, isotonicFit, isotonicQuantile } from './isotonic';
import { groupRows, type DoseRow } from './rows';

interface Quantile {
  Gamma: number;
  status: string;
  lower: number;
  upper: number;
  estimate: number;
}

const deviations = new Deviations('isotonic regression (reference 09b)');
afterAll(() => console.log(deviations.summary()));
const rowsOf = (n: number[], y: number[], x = n.map((_, i) => i + 1)): DoseRow[] =>
  n.map((size, i) => ({ x: x[i] as number, n: size, y: y[i] as number }));

describe('values of base R (reference 09b)', () => {
  for (const c of readReference<
    { x: number[]; responses: number[]; n: number[] },
    { isotonic: number[]; quantiles: Quantile[] }
  >('09b_isotonic.json')) {
    it(c.id, () => {
      const rows = rowsOf(c.inputs.n, c.inputs.responses, c.inputs.x);
      const fit = isotonicFit(rows);
      deviations.compare(fit.p, c.outputs.isotonic, c.tolerance, c.id);
      for (const expected of c.outputs.quantiles) {
        const got = isotonicQuantile(fit, expected.Gamma);
        expect(got.status).toBe(expected.status);
        deviations.compare(
          [got.lower, got.upper, got.estimate],
          [expected.lower, expected.upper, expected.estimate],
          c.tolerance,
          `${c.id} at ${expected.Gamma}`,
        );
      }
    });
  }
});

describe('fits computed in Python', () => {
  it('isotonic and centred isotonic dose at 0.25', () => {
    const rows = rowsOf([3, 6, 6, 6, 3], [0, 1, 0, 3, 2]);
    isotonicFit(rows).p.forEach((p, i) =>
      expect(p).toBeCloseTo([0, 1 / 12, 1 / 12, 0.5, 2 / 3][i] as number, 12),
    );
    expect(isotonicEstimate(rows, 0.25).estimate).toBeCloseTo(3.4, 12);
    expect(isotonicEstimate(rows, 0.25, true).estimate).toBeCloseTo(3.1, 12);
    expect(centredIsotonicFit(rows).x).toEqual([1, 2.5, 4, 5]);
  });
  it('isotonic and centred isotonic dose at 0.30, weighted block', () => {
    const rows = rowsOf([3, 3, 9, 12, 6], [0, 1, 2, 4, 4]);
    expect(isotonicEstimate(rows, 0.3).estimate).toBeCloseTo(3.6, 12);
    expect(isotonicEstimate(rows, 0.3, true).estimate).toBeCloseTo(3.5, 12);
    expect(centredIsotonicFit(rows).x[1]).toBeCloseTo(2.75, 12);
    expect(centredIsotonicFit(rows).p[1]).toBeCloseTo(0.25, 12);
  });
});

describe('conventions', () => {
  it('the dose beyond either end is the end dose, with its status', () => {
    const rows = rowsOf([3, 3, 3], [1, 2, 1]);
    expect(isotonicEstimate(rows, 0.1)).toMatchObject({ status: 'below-range', estimate: 1 });
    expect(isotonicEstimate(rows, 0.9)).toMatchObject({ status: 'above-range', estimate: 3 });
    expect(isotonicEstimate(rows, 0.9, true)).toMatchObject({ status: 'above-range', estimate: 3 });
  });
  it('centred: equal neighbours are pooled, except at 0 and at 1 (Oron & Flournoy 2017)', () => {
    expect(centredIsotonicFit(rowsOf([4, 4, 4, 4, 4, 4], [0, 0, 1, 1, 4, 4]))).toEqual({
      x: [1, 2, 3.5, 5, 6],
      p: [0, 0, 0.25, 1, 1],
    });
  });
});

const trials = fc
  .array(fc.record({ n: fc.integer({ min: 1, max: 12 }), share: fc.nat(100) }), {
    minLength: 1,
    maxLength: 8,
  })
  .map((list) =>
    rowsOf(
      list.map(({ n }) => n),
      list.map(({ n, share }) => Math.round((n * share) / 100)),
    ),
  );

describe('properties', () => {
  it('the fit is the max-min of pooled proportions (Barlow et al. 1972)', () => {
    check(
      fc.property(trials, (rows) => {
        const pooled = (from: number, to: number) => {
          const part = rows.slice(from, to + 1);
          return part.reduce((sum, row) => sum + row.y, 0) / part.reduce((sum, row) => sum + row.n, 0);
        };
        isotonicFit(rows).p.forEach((p, i) => {
          let best = -Infinity;
          for (let from = 0; from <= i; from++) {
            let least = Infinity;
            for (let to = i; to < rows.length; to++) least = Math.min(least, pooled(from, to));
            best = Math.max(best, least);
          }
          expect(p).toBeCloseTo(best, 12);
        });
      }),
    );
  });

  it('centred isotonic equals isotonic where proportions rise strictly', () => {
    check(
      fc.property(trials, fc.double({ min: 0.05, max: 0.95, noNaN: true }), (rows, target) => {
        const rising = rows.every(
          (row, i) => i === 0 || row.y / row.n > (rows[i - 1] as DoseRow).y / (rows[i - 1] as DoseRow).n,
        );
        if (rising) expect(isotonicEstimate(rows, target, true)).toEqual(isotonicEstimate(rows, target));
        const { x, p } = centredIsotonicFit(rows);
        x.forEach((dose, i) => {
          if (i === 0) return;
          expect(dose).toBeGreaterThan(x[i - 1] as number);
          if (p[i] !== 0 && p[i] !== 1) expect(p[i]).toBeGreaterThan(p[i - 1] as number);
        });
      }),
    );
  });

  it('more responses never raise the estimated dose', () => {
    check(
      fc.property(trials, fc.nat(7), fc.double({ min: 0.05, max: 0.95, noNaN: true }), (rows, at, target) => {
        const more = rows.map((row, i) =>
          i === at % rows.length && row.y < row.n ? { ...row, y: row.y + 1 } : row,
        );
        const before = isotonicEstimate(rows, target).estimate;
        expect(isotonicEstimate(more, target).estimate).toBeLessThanOrEqual(before + 1e-9);
      }),
    );
  });

  it('grouping merges doses, sorts them and drops empty rows', () => {
    expect(
      groupRows([
        { x: 2, n: 1, y: 1 },
        { x: 1, n: 2, y: 0 },
        { x: 3, n: 0, y: 0 },
        { x: 2, n: 3, y: 1 },
      ]),
    ).toEqual([
      { x: 1, n: 2, y: 0 },
      { x: 2, n: 4, y: 2 },
    ]);
    expect(() => groupRows([{ x: 1, n: 2, y: 3 }])).toThrow(RangeError);
  });
});

describe('bootstrap', () => {
  const rows = rowsOf([6, 6, 6, 6], [0, 1, 3, 5]);

  it('type-7 percentiles (Hyndman & Fan 1996): the default of base R', () => {
    // quantile(c(1, 2, 4, 8), c(0, .1, .25, .5, .9, 1)) by the definition 1 + (N − 1)q.
    expect([0, 0.1, 0.25, 0.5, 0.9, 1].map((q) => sampleQuantile([1, 2, 4, 8], q))).toEqual(
      [1, 1.3, 1.75, 3, 6.8, 8].map((v) => expect.closeTo(v, 12)),
    );
  });

  it('is the same for the same seed and another for another', () => {
    const a = bootstrapInterval(rows, 0.4, 0.9, { seed: 5 });
    expect(bootstrapInterval(rows, 0.4, 0.9, { seed: 5 })).toEqual(a);
    expect(bootstrapInterval(rows, 0.4, 0.9, { seed: 6 })).not.toEqual(a);
  });

  it('an end with more than α/2 of flagged draws is not bounded', () => {
    const interval = bootstrapInterval(rowsOf([6, 6, 6], [0, 1, 2]), 0.33, 0.9);
    expect(interval?.shareAtHighest).toBeGreaterThan(0.05);
    expect(interval?.upper).toBeNull();
    expect(interval?.shareAtLowest).toBeLessThan(0.05);
    expect(interval?.lower).not.toBeNull();
  });

  it('is none when every fitted proportion is 0 or 1', () => {
    expect(bootstrapInterval(rowsOf([3, 3], [0, 3]), 0.3, 0.95)).toBeNull();
  });

  // Two doses, p̂ = 0 at the lower: the draw's dose at Γ is x₁ + Γ/(y/n), so its distribution is that of a binomial count,
  // known exactly. Percentiles of 2,000 draws are order statistics; with discrete values they fall on the exact ones.
  it('agrees with the exact distribution in a case that can be enumerated', () => {
    const two = rowsOf([8, 8], [0, 4], [0, 1]);
    const interval = bootstrapInterval(two, 0.25, 0.8, { seed: 3 });
    // P(Y ≤ 2) = 0.145 > 0.1 ≥ P(Y ≤ 1) = 0.035: upper end at y = 2; P(Y ≥ 6) = 0.145, P(Y ≥ 7) = 0.035: lower end at y = 6.
    expect(interval?.lower).toBeCloseTo(0.25 / (6 / 8), 12);
    expect(interval?.upper).toBeCloseTo(0.25 / (2 / 8), 12);
  });
});
