import { describe, expect, it } from 'vitest';
import { designSchema, type Design } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { curveThroughPoints, type BelievedCurve } from './believed-curve';
import { adviceTexts, adviseDesign, isExtremeTarget } from './design-advice';

function curve(p1: number, p2: number, d1 = 20, d2 = 80): BelievedCurve {
  const direction = p2 > p1 ? 1 : -1;
  const points = [
    { dose: d1, probability: p1 },
    { dose: d2, probability: p2 },
  ] as const;
  const result = curveThroughPoints('logit', points, 'log', direction);
  if (!result.ok) throw new Error(result.error.message);
  return result.value;
}

const range = (changes: Partial<Design> = {}): Design =>
  designSchema.parse({ ...designDefaults('range'), ...changes });
const levels = (changes: Partial<Design> = {}): Design =>
  designSchema.parse({ ...designDefaults('levels'), ...changes });
const robbinsMonro = {
  name: 'robbins-monro',
  c: 4,
  k0: 0,
  gamma: 1,
  carry: 'iterate',
  carryReason: null,
} as const;

describe('adviseDesign', () => {
  it('best gain is the inverse of D, and the target dose that of the curve', () => {
    const believed = curve(0.1, 0.5);
    const advice = adviseDesign(range(), { curve: believed });
    const slope = believed.slope * 0.25 * 0.75;
    expect(advice.bestGain).toBeCloseTo(1 / slope, 12);
    expect(advice.targetDose).toBeGreaterThan(20);
    expect(advice.targetDose).toBeLessThan(80);
    expect(advice.gains.believed.efficiency).toBeCloseTo((2 * 4 * slope - 1) / (4 * slope) ** 2, 10);
    expect(advice.notes).toEqual([]);
  });

  it('judges the ends of a range of slopes', () => {
    const advice = adviseDesign(range(), {
      curve: curve(0.1, 0.5),
      slopeRange: { lowest: 0.1, highest: 0.6 },
    });
    expect(advice.gains.lowest).toMatchObject({ tooSmall: true, asymptoticError: null });
    expect(advice.notes).toContain('gain-too-small-for-lowest-slope');
    expect(advice.slopes.highest.curve).toBe(0.6);
  });

  it.each([
    ['gain-too-small', range({ rule: { ...robbinsMonro, c: 1 } })],
    ['gain-inefficient', range({ rule: { ...robbinsMonro, c: 40 } })],
    ['extreme-target', range({ target: 0.2 })],
    ['start-above-target', range({ startingDose: '100' })],
    [
      'averaging-needs-smaller-exponent',
      range({ finalEstimator: { name: 'polyak-ruppert', burnIn: 3, intervalLevel: 0.9 } }),
    ],
    ['alternates-between-levels', levels({ rule: robbinsMonro })],
    ['freezes', levels({ rule: { ...robbinsMonro, carry: 'given', carryReason: 'wished' } })],
    ['no-settling-level', levels({ rule: { name: 'virtual-observations', slope: 0.02, carryBounds: null } })],
    [
      'several-settling-levels',
      levels({ rule: { name: 'virtual-observations', slope: 2, carryBounds: null } }),
    ],
  ] as const)('notes %s', (note, design) => {
    expect(adviseDesign(design, { curve: curve(0.1, 0.52) }).notes).toContain(note);
    expect(adviceTexts[note]).toMatch(/\.$/);
  });

  it('notes a target dose outside the doses, and slopes outside an adaptive rule’s bounds', () => {
    const adaptive = {
      name: 'adaptive-slope',
      form: 'last',
      initialSlope: 1,
      slopeLow: 0.9,
      slopeHigh: 2,
      weighted: false,
      carry: 'iterate',
      carryReason: null,
    } as const;
    const { notes } = adviseDesign(range({ rule: adaptive }), { curve: curve(0.01, 0.05) });
    expect(notes).toContain('target-dose-outside-doses');
    expect(notes).toContain('assumed-slope-outside-belief');
  });

  it('virtual observations on levels come with the levels they settle on', () => {
    const advice = adviseDesign(levels(), { curve: curve(0.1, 0.5) });
    expect(advice.settling).not.toBeNull();
    expect(adviseDesign(range(), { curve: curve(0.1, 0.5) }).settling).toBeNull();
  });

  it('refuses a curve on another scale or in the other direction', () => {
    expect(() => adviseDesign(range(), { curve: { ...curve(0.1, 0.5), scale: 'linear' } })).toThrow(
      RangeError,
    );
    expect(() => adviseDesign(range(), { curve: curve(0.5, 0.1) })).toThrow(RangeError);
  });

  it('targets outside 0.25 to 0.75 are extreme', () => {
    expect([0.2, 0.25, 0.5, 0.75, 0.9].map(isExtremeTarget)).toEqual([true, false, false, false, true]);
  });
});
