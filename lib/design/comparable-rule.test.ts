import { describe, expect, it } from 'vitest';
import { designSchema, type Design, type RuleSettings } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { comparableDesign, comparableRule, impliedSlope } from './comparable-rule';
import { RULE_NAMES } from './rules/registry';

const levels = designDefaults('levels');
const range = designDefaults('range');

describe('a comparable rule', () => {
  it('makes a valid design of every rule from every other, on levels and on a range', () => {
    for (const design of [levels, range]) {
      for (const from of RULE_NAMES) {
        const start: Design = { ...design, rule: comparableRule(from, design) };
        for (const name of RULE_NAMES) {
          const made = designSchema.safeParse(comparableDesign(name, start));
          expect(made.error?.issues ?? []).toEqual([]);
          expect(made.data?.rule.name).toBe(name);
        }
      }
    }
  });

  it('takes the same slope for granted as the design does, to three digits', () => {
    for (const name of RULE_NAMES) {
      const slope = impliedSlope(comparableRule(name, levels), levels.target);
      expect(slope).toBeCloseTo(0.25, 2);
    }
  });

  it('leaves the design’s own rule as it stands', () => {
    const rule: RuleSettings = {
      name: 'kesten',
      c: 7,
      k0: 2,
      gamma: 0.8,
      carry: 'given',
      carryReason: 'Protocol.',
    };
    expect(comparableRule('kesten', { ...levels, rule })).toEqual(rule);
  });

  // D = β_P φ(Φ⁻¹(Γ)) (METHODS, three slopes); φ(0) = 1/√(2π) = 0.39894228 (any table of the normal density).
  it('turns the slope of the curve into a probit slope for Joseph’s rule', () => {
    const design: Design = {
      ...levels,
      target: 0.5,
      rule: { name: 'virtual-observations', slope: 0.3, carryBounds: null },
    };
    expect(comparableRule('joseph', design)).toMatchObject({
      slope: Number((0.3 / 0.39894228).toPrecision(3)),
    });
  });

  it('drops a precision rule that only Robbins & Monro’s rule has', () => {
    const design: Design = {
      ...range,
      stopping: {
        ...range.stopping,
        precision: { estimator: 'last-iterate', level: 0.8, width: 1, minimumSubjects: 12 },
      },
    };
    expect(comparableDesign('robbins-monro', design).stopping.precision).not.toBeNull();
    expect(comparableDesign('joseph', design).stopping.precision).toBeNull();
  });
});
