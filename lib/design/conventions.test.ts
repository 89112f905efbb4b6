import { describe, expect, it } from 'vitest';
import type { Design, DesignInput } from '@/lib/schemas/design';
import { cohort, history, levelsDesign, NO_GUARDRAILS, rangeDesign } from '@/tests/designs';
import type { History } from './history';
import { recommend, recommendUnder, type Recommendation } from './recommend';

// The points of docs/decisions/2026-12-01-recommendation-conventions.md that other tests do not hold.

function recommended(design: Design, past: History): Recommendation {
  const result = recommend(design, past);
  if (!result.ok) throw new Error(result.error.message);
  return result.value;
}

const falling = { present: 'a', absent: 'b', kind: 'harm', direction: 'falling' } as const;
const wide = { lowest: -50, highest: 50 };

describe('a lowered release', () => {
  const rules: DesignInput['rule'][] = [
    { name: 'robbins-monro', c: 1, k0: 0, gamma: 1, carry: 'iterate' },
    { name: 'kesten', c: 1, k0: 0, gamma: 1, carry: 'iterate' },
    { name: 'joseph', slope: 1, priorSd: 1 },
    {
      name: 'adaptive-slope',
      form: 'last',
      initialSlope: 1,
      slopeLow: 0.1,
      slopeHigh: 2,
      weighted: false,
      carry: 'iterate',
    },
  ];

  it.each(rules.map((rule) => [rule.name, rule] as const))(
    'starts %s from the lower value, two levels down',
    (_name, rule) => {
      const design = levelsDesign({
        rule,
        startingDose: '4',
        guardrails: { ...NO_GUARDRAILS, projection: wide },
      });
      const next = (lowered: boolean) =>
        recommended(design, { cohorts: [cohort(1, '2', [0, 0, 1], { lowered })] }).nextValue;
      expect(next(true)).toBeCloseTo(next(false) - 2, 12);
    },
  );

  it('changes nothing for the rules that use doses given', () => {
    const others: DesignInput['rule'][] = [
      { name: 'virtual-observations', slope: 0.2 },
      { name: 'logit-ml', firth: true, c: 1, largestMove: 3 },
      {
        ...(rules[3] as { name: 'adaptive-slope' } & DesignInput['rule']),
        form: 'mean',
      } as DesignInput['rule'],
    ];
    for (const rule of others) {
      const design = levelsDesign({ rule, startingDose: '4' });
      const next = (lowered: boolean) =>
        recommended(design, { cohorts: [cohort(1, '2', [0, 0, 1], { lowered })] }).nextValue;
      expect(next(true)).toBe(next(false));
    }
  });
});

describe('a response that falls with dose', () => {
  it('is bounded by real working values', () => {
    const rule = {
      name: 'virtual-observations',
      slope: 0.1,
      carryBounds: { lowest: 1.5, highest: 4.5 },
    } as const;
    const design = levelsDesign({ response: falling, rule });
    expect(recommended(design, history(['2', [0, 0, 0]])).nextValue).toBe(1.5);
    expect(recommended(design, history(['2', [1, 1, 1]])).nextValue).toBe(4.5);
  });

  it('stops on a range by the subjects given the highest dose or more', () => {
    const design = rangeDesign({
      response: falling,
      target: 0.25,
      startingDose: '40',
      rule: { name: 'robbins-monro', c: 4, k0: 0, gamma: 1, carry: 'iterate' },
      guardrails: {
        ...NO_GUARDRAILS,
        largestRise: { kind: 'step', step: 5 },
        closing: { priorA: 1, priorB: 1, cutoff: 0.9, minimumEvaluable: 3, scope: 'every-level' },
      },
    });
    const given = (doses: string[]) => ({ cohorts: [cohort(1, '40', [1, 1, 1], { given: doses })] });
    expect(recommended(design, given(['40', '40', '41']))).toMatchObject({ kind: 'stop', dose: null });
    expect(recommended(design, given(['40', '39.5', '40']))).toMatchObject({ kind: 'dose' });
  });
});

describe('amendments', () => {
  it('fit the adaptive slope to all cohorts but restart its index and value', () => {
    const rule: Extract<Design['rule'], { name: 'adaptive-slope' }> = {
      name: 'adaptive-slope',
      form: 'last',
      initialSlope: 0.5,
      slopeLow: 0.01,
      slopeHigh: 2,
      weighted: false,
      carry: 'iterate',
      carryReason: null,
    };
    const first = levelsDesign({ rule, guardrails: { ...NO_GUARDRAILS, projection: wide } });
    const second = { ...first, target: 0.3 };
    const past = history(['2', [0, 0, 0]], ['4', [1, 0, 1]], ['3', [1, 0, 0]]);
    const result = recommendUnder(
      [
        { fromCohort: 1, design: first },
        { fromCohort: 3, design: second },
      ],
      past,
    );
    // least squares through (2, 0), (4, 2/3), (3, 1/3): slope 1/3; index 1, from the dose signed for cohort 3
    expect(result.ok && result.value.nextValue).toBeCloseTo(3 - (1 / 3 - 0.3) / (1 / 3), 12);
  });
});

describe('equal doses', () => {
  it('have an equal mean, so that a cohort at one dose has exactly its working value', () => {
    const design = levelsDesign({
      scale: 'log',
      doses: { kind: 'levels', levels: ['0.1', '0.7', '3.3'] },
      startingDose: '0.7',
      rule: { name: 'robbins-monro', c: 1, k0: 0, gamma: 1, carry: 'given', carryReason: 'test' },
    });
    const past = history(['0.7', [0, 1, 0, 0, 0, 0, 0]]);
    expect(recommended(design, past).nextValue).toBe(Math.log(0.7) - (1 / 7 - 0.25));
  });
});
