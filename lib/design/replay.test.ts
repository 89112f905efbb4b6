import { describe, expect, it } from 'vitest';
import type { Design } from '@/lib/schemas/design';
import { cohort, history, levelsDesign, NO_GUARDRAILS, rangeDesign } from '@/tests/designs';
import type { History } from './history';
import { recommend, recommendUnder } from './recommend';

describe('amendments', () => {
  const first = levelsDesign();
  const past = history(['2', [0, 0, 0]], ['3', [0, 1, 0]], ['3', [1, 0, 0]]);

  it('goes on with the same rule, target and scale, under new settings', () => {
    const second = { ...first, rule: { ...first.rule, c: 2 } as Design['rule'] };
    const result = recommendUnder(
      [
        { fromCohort: 1, design: first },
        { fromCohort: 3, design: second },
      ],
      past,
    );
    // x_3 under version 1: 2 + 4/4 = 3, then 3 − 2(1/3 − 1/4); version 2: a_3 = 2/3
    const x3 = 3 - 2 * (1 / 3 - 0.25);
    expect(result.ok && result.value.nextValue).toBeCloseTo(x3 - (2 / 3) * (1 / 3 - 0.25), 12);
  });

  it('starts afresh at the signed dose with another target or rule', () => {
    const second = { ...first, target: 0.3 };
    const result = recommendUnder(
      [
        { fromCohort: 1, design: first },
        { fromCohort: 3, design: second },
      ],
      past,
    );
    expect(result.ok && result.value.nextValue).toBeCloseTo(3 - 4 * (1 / 3 - 0.3), 12);
    expect(result.ok && result.value.ruleState.numbers.index).toBe(1);
    expect(result.ok && result.value.stepIndex).toBe(3);
  });

  it('uses all cohorts for virtual observations and for the guardrails', () => {
    const second: Design = {
      ...first,
      rule: { name: 'virtual-observations', slope: 0.2, carryBounds: null },
      guardrails: {
        ...first.guardrails,
        closing: { priorA: 1, priorB: 1, cutoff: 0.5, minimumEvaluable: 6, scope: 'every-level' },
      },
    };
    const result = recommendUnder(
      [
        { fromCohort: 1, design: first },
        { fromCohort: 3, design: second },
      ],
      past,
    );
    const mean = (2 + 3 + 3) / 3;
    expect(result.ok && result.value.nextValue).toBeCloseTo(mean - (2 / 9 - 0.25) / 0.2, 12);
    // level 3 has 2 of 6, its posterior 0.76 (FACTS A6, 22)
    expect(result.ok && result.value.closedFrom).toBe('3');
  });

  it('does not use a version before its first cohort is complete', () => {
    const versions = [
      { fromCohort: 1, design: first },
      { fromCohort: 4, design: { ...first, target: 0.9 } },
    ];
    expect(recommendUnder(versions, past)).toEqual(recommend(first, past));
  });
});

describe('histories that do not fit', () => {
  const design = levelsDesign();
  const refusal = (past: unknown) => {
    const result = recommend(design, past as History);
    if (result.ok || result.error.code !== 'history') throw new Error('It was not refused.');
    return result.error;
  };

  it.each([
    [
      'a released dose that is no level',
      history(['2.5', [0]]),
      ['cohorts', 0, 'released'],
      /none of the design's doses/,
    ],
    ['a cohort out of order', { cohorts: [cohort(2, '2', [0])] }, ['cohorts', 0, 'number'], /in order/],
    [
      'a dose given that is no decimal',
      { cohorts: [cohort(1, '2', [0], { given: ['two'] })] },
      ['cohorts', 0, 'subjects', 0, 'given'],
      /not a decimal/,
    ],
    [
      'a dose given as a number',
      { cohorts: [{ ...cohort(1, '2', [0]), subjects: [{ given: 2, response: false }] }] },
      ['cohorts', 0, 'subjects', 0, 'given'],
      /not given as text/,
    ],
    [
      'a fractional response',
      { cohorts: [{ ...cohort(1, '2', [0]), subjects: [{ given: '2', response: 0.5 }] }] },
      ['cohorts', 0, 'subjects', 0, 'response'],
      /true or false/,
    ],
    [
      'a missing mark',
      { cohorts: [{ ...cohort(1, '2', [0]), loweredRelease: undefined }] },
      ['cohorts', 0, 'loweredRelease'],
      /lowered/,
    ],
    ['no list', {}, ['cohorts'], /missing/],
  ])('refuses %s', (_name, past, path, message) => {
    const error = refusal(past);
    expect(error.path).toEqual(path);
    expect(error.message).toMatch(message);
  });

  it('refuses a dose of 0 on the log scale', () => {
    const log = levelsDesign({ scale: 'log' });
    const past = { cohorts: [cohort(1, '2', [0], { given: ['0'] })] };
    expect(recommend(log, past)).toMatchObject({ ok: false, error: { code: 'history' } });
  });

  it('takes a decimal with trailing zeros for the same dose', () => {
    const result = recommend(design, history(['2.0000000000', [0, 0, 0]]));
    expect(result.ok && result.value.dose).toBe('3');
  });
});

describe('numbers that leave the range of doubles', () => {
  it('names an overflow with the state at which it arose', () => {
    const design = rangeDesign({
      target: 0.5,
      rule: { name: 'robbins-monro', c: 1.7e308, k0: 0, gamma: 1, carry: 'iterate' },
      guardrails: { ...NO_GUARDRAILS, projection: { lowest: -1.7e308, highest: 1.7e308 } },
    });
    const past = history(['20', [1, 1]], ['5', [1, 1]], ['5', [1, 1]], ['5', [1, 1]], ['5', [1, 1]]);
    const result = recommend(design, past);
    expect(result).toMatchObject({ ok: false, error: { code: 'overflow', cohort: 5, state: { step: 5 } } });
  });
});
