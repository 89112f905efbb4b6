import { describe, expect, it } from 'vitest';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { designSchema, type Design, type FinalEstimator, type PrecisionRule } from '@/lib/schemas/design';
import { normalQuantile } from '../distributions';
import { estimateTarget } from './estimate';
import { precisionReached } from './precision';
import { estimateReasonTexts, type EstimationData } from './target-estimate';

/** A range design, linear scale, of doses 0 to 100 mg, changed as asked and checked by the schema. */
function rangeDesign(changes: Partial<Design> = {}): Design {
  const base = designDefaults('range');
  return designSchema.parse({
    ...base,
    doses: { kind: 'range', lowest: '1', highest: '100', increment: '1' },
    startingDose: '20',
    scale: 'linear',
    target: 0.3,
    guardrails: { ...base.guardrails, largestRise: { kind: 'step', step: 50 } },
    rule: { name: 'robbins-monro', c: 200, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
    ...changes,
  });
}

const rising: EstimationData = {
  rows: [
    { x: 20, n: 6, y: 0 },
    { x: 30, n: 6, y: 1 },
    { x: 40, n: 9, y: 3 },
    { x: 50, n: 6, y: 4 },
  ],
  cohortSizes: [3, 3, 3, 3, 3, 3, 3, 3, 3],
  iterates: [20, 35, 41, 38, 45, 40, 37, 42, 39.5, 38.25],
};

const estimators: FinalEstimator[] = [
  { name: 'last-iterate', intervalLevel: 0.9 },
  { name: 'polyak-ruppert', burnIn: 2, intervalLevel: 0.9 },
  { name: 'isotonic', intervalLevel: 0.9 },
  { name: 'centred-isotonic', intervalLevel: 0.9 },
  { name: 'logit', firth: false, interval: 'delta', intervalLevel: 0.9 },
  { name: 'logit', firth: true, interval: 'fieller', intervalLevel: 0.9 },
  { name: 'probit', firth: false, interval: 'fieller', intervalLevel: 0.9 },
];

describe('estimateTarget', () => {
  it.each(estimators.map((e) => [e.name, e] as const))(
    '%s gives an estimate inside the doses',
    (_, estimator) => {
      const result = estimateTarget(rangeDesign(), rising, { estimator });
      expect(result.reason).toBeNull();
      expect(result.x).toBeGreaterThan(20);
      expect(result.x).toBeLessThan(50);
      expect(result.dose).toBe(result.x);
      if (result.interval?.type === 'bounded') {
        expect(result.interval.lower).toBeLessThan(result.x as number);
        expect(result.interval.upper).toBeGreaterThan(result.x as number);
      }
      expect((result.interval === null) === (result.intervalReason !== null)).toBe(true);
    },
  );

  it('last iterate: Sacks interval from the slope of the logit fit, written out', () => {
    const [estimator] = estimators as [FinalEstimator];
    const result = estimateTarget(rangeDesign(), rising, { estimator });
    const slope = (result.fit?.slope as number) * 0.3 * 0.7;
    const variance = (200 * 200 * 0.3 * 0.7) / 3 / (2 * 200 * slope - 1);
    const half = normalQuantile(0.95) * Math.sqrt(variance / 9);
    expect(result.x).toBe(38.25);
    expect(result.interval?.lower).toBeCloseTo(38.25 - half, 9);
    expect(result.interval?.upper).toBeCloseTo(38.25 + half, 9);
  });

  it.each([
    ['levels', { doses: { kind: 'levels', levels: ['20', '30', '40', '50'] } }],
    [
      'gain-exponent',
      { rule: { name: 'robbins-monro', c: 200, k0: 0, gamma: 0.7, carry: 'iterate', carryReason: null } },
    ],
    [
      'carries-given',
      { rule: { name: 'robbins-monro', c: 200, k0: 0, gamma: 1, carry: 'given', carryReason: 'wished' } },
    ],
    [
      'gain-too-small',
      { rule: { name: 'robbins-monro', c: 10, k0: 0, gamma: 1, carry: 'iterate', carryReason: null } },
    ],
    [
      'rule-has-none',
      { rule: { name: 'kesten', c: 200, k0: 0, gamma: 1, carry: 'iterate', carryReason: null } },
    ],
  ] as [string, Partial<Design>][])('last iterate has no interval: %s', (reason, changes) => {
    const result = estimateTarget({ ...rangeDesign(), ...changes }, rising, { estimator: estimators[0] });
    expect(result.x).toBe(38.25);
    expect(result.interval).toBeNull();
    expect(result.intervalReason).toBe(reason);
  });

  it('last iterate has no interval before a slope can be fitted', () => {
    const data = { ...rising, rows: [{ x: 20, n: 3, y: 0 }], cohortSizes: [3], iterates: [20, 35] };
    expect(estimateTarget(rangeDesign(), data, { estimator: estimators[0] })).toMatchObject({
      x: 35,
      interval: null,
      intervalReason: 'slope-unknown',
    });
  });

  it("last iterate under Joseph's rule: x ± z τ, called model-based", () => {
    const design = rangeDesign({ rule: { name: 'joseph', slope: 0.05, priorSd: 30 } });
    const result = estimateTarget(design, { ...rising, priorSd: 4 }, { estimator: estimators[0] });
    expect(result.interval).toMatchObject({ method: 'model-based', type: 'bounded' });
    expect(result.interval?.upper).toBeCloseTo(38.25 + 4 * normalQuantile(0.95), 12);
    expect(result.flags).toContain('model-based-interval');
  });

  it('averages: both means, and a warning at γ = 1', () => {
    const result = estimateTarget(rangeDesign(), rising, { estimator: estimators[1] });
    expect(result.x).toBeCloseTo((41 + 38 + 45 + 40 + 37 + 42 + 39.5 + 38.25) / 8, 12);
    expect(result.assignedMean).toBeCloseTo((41 + 38 + 45 + 40 + 37 + 42 + 39.5) / 7, 12);
    expect(result.flags).toContain('averaging-with-gain-exponent-one');
    expect(
      estimateTarget(rangeDesign(), { ...rising, iterates: [20, 35] }, { estimator: estimators[1] }).reason,
    ).toBe('burn-in');
  });

  it.each([
    [
      'all-nonresponse',
      [
        { x: 20, n: 3, y: 0 },
        { x: 30, n: 3, y: 0 },
      ],
    ],
    ['single-dose', [{ x: 20, n: 6, y: 2 }]],
    [
      'separated-increasing',
      [
        { x: 20, n: 3, y: 0 },
        { x: 30, n: 3, y: 3 },
      ],
    ],
    [
      'no-slope',
      [
        { x: 20, n: 3, y: 2 },
        { x: 30, n: 3, y: 1 },
      ],
    ],
    ['no-data', []],
  ])('a curve says why it has no estimate: %s', (reason, rows) => {
    const result = estimateTarget(rangeDesign(), { ...rising, rows }, { estimator: estimators[4] });
    expect(result).toMatchObject({ x: null, dose: null, reason, interval: null, intervalReason: reason });
    expect(estimateReasonTexts[reason as 'no-slope']).toMatch(/\.$/);
  });

  it("Fieller's unbounded sets are shown but count as no interval", () => {
    const rows = [
      { x: 20, n: 3, y: 1 },
      { x: 30, n: 3, y: 1 },
      { x: 40, n: 3, y: 2 },
    ];
    const result = estimateTarget(rangeDesign(), { ...rising, rows }, { estimator: estimators[6] });
    expect(result.interval?.type).not.toBe('bounded');
    expect(result.flags).toContain('interval-not-bounded');
  });

  it("Firth's fit is used where asked for, also where the maximum-likelihood fit exists", () => {
    const firth = estimateTarget(rangeDesign(), rising, { estimator: estimators[5] });
    expect(firth.fit?.method).toBe('firth');
    expect(Math.abs(firth.fit?.slope as number)).toBeLessThan(
      estimateTarget(rangeDesign(), rising, { estimator: estimators[4] }).fit?.slope as number,
    );
  });

  it('centred isotonic: the bootstrap is repeatable and depends on its seed', () => {
    const at = (seed: number) => estimateTarget(rangeDesign(), rising, { estimator: estimators[3], seed });
    expect(at(4)).toEqual(at(4));
    expect(at(4).bootstrap).toMatchObject({ seed: 4, draws: 2000 });
    expect(at(4).interval).not.toEqual(at(5).interval);
  });

  it('isotonic: doses off the levels count at the nearest level, ties lower', () => {
    const design = { ...rangeDesign(), doses: { kind: 'levels' as const, levels: ['20', '30', '40', '50'] } };
    const exact = estimateTarget(design, rising, { estimator: estimators[2] });
    const moved = rising.rows.map((row) => (row.x === 40 ? { ...row, x: 45 } : row));
    const split = [...moved, { x: 21, n: 3, y: 0 }];
    const rows = rising.rows.map((row) => (row.x === 20 ? { ...row, n: 9 } : row));
    expect(estimateTarget(design, { ...rising, rows: moved }, { estimator: estimators[2] })).toEqual(exact);
    expect(estimateTarget(design, { ...rising, rows: split }, { estimator: estimators[2] })).toEqual(
      estimateTarget(design, { ...rising, rows }, { estimator: estimators[2] }),
    );
  });

  it('isotonic: beyond the doses, the end dose, flagged; all or none: no interval', () => {
    const none = {
      ...rising,
      rows: [
        { x: 20, n: 3, y: 0 },
        { x: 30, n: 3, y: 0 },
      ],
    };
    expect(estimateTarget(rangeDesign(), none, { estimator: estimators[2] })).toMatchObject({
      x: 30,
      flags: ['beyond-highest-dose'],
      interval: null,
      intervalReason: 'all-or-none',
    });
  });

  it('on the log scale the dose is the exponential of the estimate, ends too', () => {
    const design = rangeDesign({ scale: 'log', rule: { ...rangeDesign().rule, c: 4 } as Design['rule'] });
    const rows = rising.rows.map((row) => ({ ...row, x: Math.log(row.x) }));
    const result = estimateTarget(design, { ...rising, rows }, { estimator: estimators[4] });
    expect(result.dose).toBeCloseTo(Math.exp(result.x as number), 10);
    expect(result.interval?.lowerDose).toBeCloseTo(Math.exp(result.interval?.lower as number), 10);
  });

  it.each(estimators.map((e) => [e.name, e] as const))(
    '%s: a falling response on mirrored doses mirrors estimate and interval',
    (name, estimator) => {
      const design = rangeDesign();
      const falling: Design = { ...design, response: { ...design.response, direction: 'falling' } };
      const mirror = (x: number) => 70 - x;
      const mirrored: EstimationData = {
        ...rising,
        rows: rising.rows.map((row) => ({ ...row, x: mirror(row.x) })),
        iterates: Array.from(rising.iterates, mirror),
      };
      const a = estimateTarget(design, rising, { estimator });
      const b = estimateTarget(falling, mirrored, { estimator });
      expect(b.x).toBeCloseTo(mirror(a.x as number), 8);
      expect(b.flags).toEqual(a.flags);
      if (a.interval === null || a.interval.lower === null || a.interval.upper === null) return;
      expect(b.interval?.lower).toBeCloseTo(mirror(a.interval.upper), 7);
      expect(b.interval?.upper).toBeCloseTo(mirror(a.interval.lower), 7);
      if (a.fit && name !== 'last-iterate') expect(b.fit?.slope).toBeCloseTo(-a.fit.slope, 9);
    },
  );
});

describe('precisionReached', () => {
  const rule: PrecisionRule = { estimator: 'logit-delta', level: 0.8, width: 40, minimumSubjects: 12 };
  const verdict = (changes: Partial<PrecisionRule> = {}, data: Partial<EstimationData> = {}) =>
    precisionReached(rangeDesign(), { ...rule, ...changes }, { ...rising, ...data });

  it('is reached by a narrow, bounded interval inside the doses', () => {
    expect(verdict()).toMatchObject({ reached: true, because: null });
    expect(verdict({ estimator: 'last-iterate' })).toMatchObject({ reached: true });
    expect(verdict({ estimator: 'probit-fieller', width: 60 })).toMatchObject({ reached: true });
  });
  it('is exactly the width of the interval', () => {
    const { lower, upper } = verdict().estimate?.interval as { lower: number; upper: number };
    expect(verdict({ width: upper - lower }).reached).toBe(true);
    expect(verdict({ width: (upper - lower) * (1 - 1e-12) })).toMatchObject({
      reached: false,
      because: 'too-wide',
    });
  });
  it.each([
    ['too-few-subjects', { minimumSubjects: 28 }, {}],
    [
      'no-fit',
      {},
      {
        rows: [
          { x: 20, n: 12, y: 0 },
          { x: 30, n: 6, y: 6 },
        ],
      },
    ],
    ['no-fit', { estimator: 'last-iterate' }, { rows: [{ x: 20, n: 12, y: 4 }] }],
    [
      'estimate-outside-doses-given',
      {},
      {
        rows: [
          { x: 20, n: 12, y: 1 },
          { x: 30, n: 12, y: 2 },
        ],
      },
    ],
    ['estimate-outside-doses-given', { estimator: 'last-iterate' }, { iterates: [20, 50] }],
    [
      'no-bounded-interval',
      { estimator: 'logit-fieller', level: 0.99 },
      {
        rows: [
          { x: 20, n: 6, y: 1 },
          { x: 40, n: 6, y: 3 },
        ],
      },
    ],
    [
      'interval-outside-doses',
      { level: 0.99999, width: 1e6 },
      {
        rows: [
          { x: 20, n: 6, y: 1 },
          { x: 40, n: 6, y: 3 },
        ],
      },
    ],
  ] as [string, Partial<PrecisionRule>, Partial<EstimationData>][])(
    'is not reached: %s',
    (because, changes, data) => {
      expect(verdict(changes, data)).toMatchObject({ reached: false, because });
    },
  );
});
