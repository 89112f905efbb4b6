import { afterAll, describe, expect, it } from 'vitest';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import { runRule } from '@/tests/run-rule';
import type { SettingsOf } from '@/lib/schemas/design';
import { RULE } from '../trial-state';

type Settings = SettingsOf<'robbins-monro'>;
const settings = (c: number, k0 = 0, gamma = 1, carry: Settings['carry'] = 'iterate'): Settings => ({
  name: 'robbins-monro',
  c,
  k0,
  gamma,
  carry,
  carryReason: null,
});

interface Inputs {
  responses: number[];
  cohort_size: number | number[];
  Gamma: number;
  c: number;
  k0: number;
  g: number;
  x1: number;
  xmin: number;
  xmax: number;
}
interface Outputs {
  ybar: number[];
  a: number[];
  raw: number[];
  x: number[];
}

describe('Robbins–Monro', () => {
  const deviations = new Deviations('Robbins–Monro (01)');
  afterAll(() => console.log(deviations.summary()));

  for (const reference of readReference<Inputs, Outputs>('01_robbins_monro.json')) {
    it(`agrees with base R: ${reference.id}`, () => {
      const { inputs, outputs, tolerance } = reference;
      const run = runRule(settings(inputs.c, inputs.k0, inputs.g), {
        target: inputs.Gamma,
        x1: inputs.x1,
        responses: inputs.responses,
        sizes: inputs.cohort_size,
        lowest: inputs.xmin,
        highest: inputs.xmax,
      });
      const gains = run.registers.map((r) => r[RULE.GAIN]);
      deviations.compare(gains, outputs.a, tolerance, `${reference.id} a`);
      deviations.compare(run.raw, outputs.raw, tolerance, `${reference.id} raw`);
      deviations.compare(run.x, outputs.x, tolerance, `${reference.id} x`);
    });
  }

  for (const reference of readReference<
    Omit<Inputs, 'x1' | 'xmin' | 'xmax'> & {
      dose1: number;
      dose_min: number;
      dose_max: number;
      scale: string;
    },
    { x: number[] }
  >('03_polyak_ruppert.json')) {
    it(`agrees with base R on the values averaged: ${reference.id}`, () => {
      const { inputs, outputs, tolerance } = reference;
      const w = inputs.scale === 'log' ? Math.log : (dose: number) => dose;
      const run = runRule(settings(inputs.c, inputs.k0, inputs.g), {
        target: inputs.Gamma,
        x1: w(inputs.dose1),
        responses: inputs.responses,
        sizes: inputs.cohort_size,
        lowest: w(inputs.dose_min),
        highest: w(inputs.dose_max),
      });
      deviations.compare(run.x, outputs.x, tolerance, `${reference.id} x`);
    });
  }

  // Check values computed for this project from the published recursion (FACTS A6, 1–3 and 5)
  it.each([
    [
      'single subjects, target 0.25',
      { c: 20, gamma: 1, x1: 20, target: 0.25, y: [0, 0, 1, 0, 0, 0, 1, 0], m: 1 },
      [20, 25, 27.5, 22.5, 23.75, 24.75, 25.583333, 23.440476, 24.065476],
    ],
    [
      'single subjects, target 0.5',
      { c: 10, gamma: 1, x1: 0, target: 0.5, y: [1, 0, 1, 1, 0, 0], m: 1 },
      [0, -5, -2.5, -4.166667, -5.416667, -4.416667, -3.583333],
    ],
    [
      'cohorts of 3',
      { c: 20, gamma: 1, x1: 20, target: 0.25, y: [0, 1, 0, 2, 1], m: 3 },
      [20, 25, 24.166667, 25.833333, 23.75, 23.416667],
    ],
    [
      'gain exponent 2/3',
      { c: 20, gamma: 2 / 3, x1: 20, target: 0.25, y: [0, 0, 1, 0, 0, 0, 1, 0], m: 1 },
      [20, 25, 28.149803, 20.938555, 22.922806, 24.632782, 26.147049, 22.047911, 23.297911],
    ],
  ])('gives the check values: %s', (_name, { c, gamma, x1, target, y, m }, expected) => {
    const run = runRule(settings(c, 0, gamma), { target, x1, responses: y, sizes: m });
    run.x.forEach((x, i) => expect(x).toBeCloseTo(expected[i] as number, 6));
  });

  it('replays a correction from there on (FACTS A6, 11)', () => {
    const run = runRule(settings(20), {
      target: 0.25,
      x1: 20,
      responses: [0, 0, 0, 0, 0, 0, 1, 0],
      sizes: 1,
    });
    expect(run.x[8]).toBeCloseTo(30.732143, 6);
  });

  it('is the running mean for a_k = 1/k on w − X_k (identity; exact up to rounding)', () => {
    // x_{k+1} = x_k − (1/k)(ȳ_k − Γ) with ȳ_k = x_k − w_k + Γ and any start is the mean of w_1 … w_k
    const values = [0.3, 0.9, 0.15, 0.55, 0.7, 0.05, 0.85];
    let mean = 0;
    let x = 0.4;
    values.forEach((w, i) => {
      const k = i + 1;
      const run = runRule(settings(1, k - 1), {
        target: 0.5,
        x1: x,
        responses: [x - w + 0.5],
        sizes: 1,
      });
      x = run.x[1] as number;
      mean += (w - mean) / k;
      expect(x).toBeCloseTo(mean, 12);
    });
  });

  it('comes closer to the root with every step when there is no noise and steps are small', () => {
    const root = 2;
    const curve = (x: number) => 1 / (1 + Math.exp(-(x - root) * 0.8 - Math.log(0.3 / 0.7)));
    let x = 5;
    for (let k = 1; k <= 40; k += 1) {
      const run = runRule(settings(1.5, k - 1), { target: 0.3, x1: x, responses: [curve(x)], sizes: 1 });
      const next = run.x[1] as number;
      expect(Math.abs(next - root)).toBeLessThan(Math.abs(x - root));
      x = next;
    }
  });

  it('starts from the lower value after a lowered release, and from the assigned one after a mere deviation', () => {
    const base = { target: 0.25, x1: 20, responses: [0], sizes: 1, given: () => 18 };
    // FACTS A6, 10: planned 20, given 18, y = 0: plain Robbins–Monro goes to 25
    expect(runRule(settings(20), base).x[1]).toBe(25);
    expect(runRule(settings(20), { ...base, lowered: () => true }).x[1]).toBe(23);
    expect(runRule(settings(20, 0, 1, 'given'), base).x[1]).toBe(23);
  });

  it('takes the lower real dose after a lowered release also where the response falls', () => {
    const run = runRule(settings(4), {
      target: 0.25,
      x1: 20,
      responses: [0],
      sizes: 1,
      sign: -1,
      given: () => 18,
      lowered: () => true,
    });
    // falling: no response means a lower dose, x_2 = 18 + 4 × (0 − 0.25)
    expect(run.x[1]).toBe(17);
  });
});
