import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { binomialCdf, binomialSurvival, normalQuantile } from '../distributions';
import { clopperPearsonInterval, jeffreysInterval, proportionInterval, wilsonInterval } from './proportion';

interface Outputs {
  wilson: number[];
  clopper_pearson: number[];
  jeffreys: number[];
  published_4dp?: { wilson: number[]; clopper_pearson: number[] } | null;
}

const deviations = {
  wilson: new Deviations('Wilson (reference 09a)'),
  clopperPearson: new Deviations('Clopper–Pearson (reference 09a)'),
  jeffreys: new Deviations('Jeffreys (reference 09a)'),
};
afterAll(() =>
  console.log(
    Object.values(deviations)
      .map((d) => d.summary())
      .join('\n'),
  ),
);
const list = ({ lower, upper }: { lower: number; upper: number }) => [lower, upper];

describe('values of base R (reference 09a)', () => {
  for (const c of readReference<{ x: number; n: number; level: number }, Outputs>(
    '09a_binomial_intervals.json',
  )) {
    it(c.id, () => {
      const { x, n, level } = c.inputs;
      const { outputs, tolerance } = c;
      deviations.wilson.compare(list(wilsonInterval(x, n, level)), outputs.wilson, tolerance, c.id);
      deviations.clopperPearson.compare(
        list(clopperPearsonInterval(x, n, level)),
        outputs.clopper_pearson,
        tolerance,
        c.id,
      );
      deviations.jeffreys.compare(list(jeffreysInterval(x, n, level)), outputs.jeffreys, tolerance, c.id);
      // Newcombe (1998, Statist. Med. 17:857-872), four decimals, as quoted from memory in the reference file.
      if (outputs.published_4dp) {
        list(wilsonInterval(x, n, level)).forEach((end, i) =>
          expect(end).toBeCloseTo(outputs.published_4dp?.wilson[i] as number, 4),
        );
        list(clopperPearsonInterval(x, n, level)).forEach((end, i) =>
          expect(end).toBeCloseTo(outputs.published_4dp?.clopper_pearson[i] as number, 4),
        );
      }
    });
  }
});

describe('95 % intervals computed in Python', () => {
  it.each([
    [0, 3, 0, 0.7076],
    [1, 3, 0.0084, 0.9057],
    [0, 6, 0, 0.45926],
    [1, 6, 0.00421, 0.64123],
    [2, 6, 0.04327, 0.77722],
    [3, 10, 0.06674, 0.65245],
    [18, 20, 0.68302, 0.98765],
  ])('Clopper–Pearson %d/%d', (y, n, lower, upper) => {
    const interval = proportionInterval(y, n, 0.95, 'clopper-pearson');
    expect(interval.lower).toBeCloseTo(lower, 5);
    expect(interval.upper).toBeCloseTo(upper, 5);
  });
  it.each([
    [0, 6, 0, 0.39033],
    [1, 6, 0.03005, 0.5635],
    [2, 6, 0.09677, 0.70001],
    [18, 20, 0.69897, 0.97213],
  ])('Wilson %d/%d', (y, n, lower, upper) => {
    const interval = proportionInterval(y, n);
    expect(interval.lower).toBeCloseTo(lower, 5);
    expect(interval.upper).toBeCloseTo(upper, 5);
  });
});

const counts = fc
  .tuple(
    fc.integer({ min: 1, max: 200 }),
    fc.double({ min: 0, max: 1, noNaN: true }),
    fc.constantFrom(0.8, 0.9, 0.95, 0.99),
  )
  .map(([n, share, level]) => ({ n, y: Math.round(share * n), level }));

describe('properties', () => {
  it('Clopper–Pearson ends leave α/2 of the binomial distribution in each tail (definition)', () => {
    check(
      fc.property(counts, ({ n, y, level }) => {
        const { lower, upper } = clopperPearsonInterval(y, n, level);
        const tail = (1 - level) / 2;
        if (y > 0) expect(binomialSurvival(y - 1, n, lower)).toBeCloseTo(tail, 10);
        if (y < n) expect(binomialCdf(y, n, upper)).toBeCloseTo(tail, 10);
      }),
    );
  });

  it('Wilson ends solve the score equation |p̂ − p| = z √(p(1 − p)/n) (definition)', () => {
    check(
      fc.property(counts, ({ n, y, level }) => {
        const z = normalQuantile(0.5 + level / 2);
        for (const p of list(wilsonInterval(y, n, level))) {
          expect(Math.abs(y / n - p)).toBeCloseTo(z * Math.sqrt((p * (1 - p)) / n), 9);
        }
      }),
    );
  });

  it('every interval holds y/n and mirrors when responses and non-responses are exchanged', () => {
    check(
      fc.property(
        counts,
        fc.constantFrom('wilson', 'clopper-pearson', 'jeffreys'),
        ({ n, y, level }, method) => {
          const a = proportionInterval(y, n, level, method);
          const b = proportionInterval(n - y, n, level, method);
          expect(a.lower).toBeLessThanOrEqual(y / n + 1e-12);
          expect(a.upper).toBeGreaterThanOrEqual(y / n - 1e-12);
          expect(a.lower).toBeCloseTo(1 - b.upper, 11);
          expect(a.upper).toBeCloseTo(1 - b.lower, 11);
        },
      ),
    );
  });

  it('refuses counts and levels that are none', () => {
    for (const [y, n, level] of [
      [1, 0, 0.95],
      [4, 3, 0.95],
      [-1, 3, 0.95],
      [1.5, 3, 0.95],
      [1, 3, 1],
      [1, 3, 0],
    ] as const) {
      expect(() => proportionInterval(y, n, level)).toThrow(RangeError);
    }
  });
});
