import { afterAll, describe, expect, it } from 'vitest';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { averagedIterates } from './polyak-ruppert';

interface Outputs {
  x: number[];
  running_mean: (number | null)[];
  average_assigned: number | null;
  average_with_next: number | null;
}

const deviations = new Deviations('Polyak–Ruppert averages (reference 03)');
afterAll(() => console.log(deviations.summary()));

describe('values of base R (reference 03)', () => {
  for (const c of readReference<{ burn_in: number }, Outputs>('03_polyak_ruppert.json')) {
    it(c.id, () => {
      const { x, running_mean, average_assigned, average_with_next } = c.outputs;
      const { burn_in } = c.inputs;
      const got = averagedIterates(x, burn_in);
      deviations.compare(got.assigned, average_assigned, c.tolerance, `${c.id} assigned`);
      deviations.compare(got.withNext, average_with_next, c.tolerance, `${c.id} with next`);
      const running = x.map((_, j) => averagedIterates(x.slice(0, j + 1), burn_in).withNext);
      deviations.compare(running, running_mean, c.tolerance, `${c.id} running`);
    });
  }
});

describe('a recursion computed in Python (A = 20, γ = 2/3, responses 0 0 1 0 … as in its doses)', () => {
  const x = [20, 25, 28.149803, 20.938555, 22.922806, 24.632782, 26.147049, 22.047911, 23.297911];
  it('means of x1…x9, x2…x9 and x1…x8', () => {
    expect(averagedIterates(x, 0).withNext).toBeCloseTo(23.681869, 6);
    expect(averagedIterates(x, 1).withNext).toBeCloseTo(24.142102, 6);
    expect(averagedIterates(x, 0).assigned).toBeCloseTo(23.729863, 6);
  });
});

it('has no mean where the burn-in leaves no value', () => {
  expect(averagedIterates([1, 2, 3], 2)).toEqual({ withNext: 3, assigned: null });
  expect(averagedIterates([1, 2, 3], 3)).toEqual({ withNext: null, assigned: null });
});
