import { afterAll, describe, expect, it } from 'vitest';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { closingBoundary, exceedanceProbability, exceedsCutoff } from './exceedance';

interface Inputs {
  Gamma: number;
  prior_a: number;
  prior_b: number;
  x?: number[];
  n: number[];
  cutoff?: number;
}

const deviations = new Deviations('beta-binomial exceedance (reference 09d)');
afterAll(() => console.log(deviations.summary()));

describe('values of base R (reference 09d)', () => {
  for (const c of readReference<Inputs, { prob_exceed?: number[]; stop_if_at_least?: (number | null)[] }>(
    '09d_beta_binomial.json',
  )) {
    it(c.id, () => {
      const { Gamma, prior_a, prior_b, x, n, cutoff } = c.inputs;
      const { prob_exceed, stop_if_at_least } = c.outputs;
      if (prob_exceed) {
        const got = n.map((size, i) =>
          exceedanceProbability(x?.[i] as number, size, Gamma, prior_a, prior_b),
        );
        deviations.compare(got, prob_exceed, c.tolerance, c.id);
      }
      if (stop_if_at_least) {
        const got = n.map((size) => closingBoundary(size, Gamma, prior_a, prior_b, cutoff as number));
        deviations.compare(got, stop_if_at_least, c.tolerance, c.id);
      }
      expect(prob_exceed ?? stop_if_at_least).toBeDefined();
    });
  }
});

describe('boundaries and posteriors computed in Python', () => {
  const sizes = [3, 6, 9, 12, 15, 18, 24, 30];
  it.each([
    [0.25, 0.9, [2, 3, 4, 5, 6, 7, 9, 11]],
    [0.25, 0.95, [3, 4, 5, 6, 7, 8, 10, 12]],
    [0.3, 0.9, [2, 4, 5, 6, 7, 8, 10, 13]],
    [0.3, 0.95, [3, 4, 5, 7, 8, 9, 11, 14]],
    [0.33, 0.9, [3, 4, 5, 6, 8, 9, 11, 14]],
    [0.33, 0.95, [3, 4, 6, 7, 8, 10, 12, 15]],
  ])('boundaries under Beta(1, 1) at Γ = %d, cutoff %d', (target, cutoff, expected) => {
    expect(sizes.map((n) => closingBoundary(n, target, 1, 1, cutoff))).toEqual(expected);
  });
  it.each([
    [1, 3, 0.25, 0.73828],
    [1, 3, 0.3, 0.6517],
    [1, 3, 0.33, 0.59852],
    [2, 3, 0.25, 0.94922],
    [2, 6, 0.3, 0.64707],
    [3, 6, 0.33, 0.83179],
    [4, 6, 0.25, 0.98712],
    [6, 12, 0.3, 0.93762],
  ])('P under Beta(1, 1): %d of %d above %d', (y, n, target, expected) => {
    expect(exceedanceProbability(y, n, target, 1, 1)).toBeCloseTo(expected, 5);
  });
  it('P under Beta(½, ½)', () => {
    expect(exceedanceProbability(2, 3, 0.3, 0.5, 0.5)).toBeCloseTo(0.91106, 5);
    expect(exceedanceProbability(3, 6, 0.3, 0.5, 0.5)).toBeCloseTo(0.85695, 5);
  });
});

it('a tie with the cutoff does not close', () => {
  // P(p > 0.5 | Beta(1, 1)) = 1/2 exactly.
  expect(exceedsCutoff(0, 0, 0.5, 1, 1, 0.5)).toBe(false);
  expect(exceedsCutoff(0, 0, 0.5, 1, 1, 0.5 - 1e-9)).toBe(true);
  expect(closingBoundary(1, 0.3, 1, 1, 0.95)).toBeNull();
});
