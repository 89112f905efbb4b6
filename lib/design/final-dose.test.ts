import { describe, expect, it } from 'vitest';
import { cohort, history, levelsDesign, NO_GUARDRAILS } from '@/tests/designs';
import { finalDose } from './final-dose';

const closing = { priorA: 1, priorB: 1, cutoff: 0.9, minimumEvaluable: 3, scope: 'every-level' } as const;
const wide = { lowest: -50, highest: 50 };
const design = (changes: Parameters<typeof levelsDesign>[0] = {}) =>
  levelsDesign({ finalEstimator: { name: 'last-iterate' }, ...changes });

function final(...args: Parameters<typeof finalDose>) {
  const result = finalDose(...args);
  if (!result.ok) throw new Error(result.error.message);
  return result.value;
}

describe('the final dose', () => {
  it('is the estimate rounded, with the subjects really given it', () => {
    const past = history(['2', [0, 0, 0]], ['3', [0, 1, 0]]);
    // x: 2 → 3 → 3 − 2(1/3 − 1/4) = 2.83
    expect(final(design(), past)).toMatchObject({ rounded: '3', dose: '3', subjectsGiven: 3 });
    const deviated = {
      cohorts: [...past.cohorts.slice(0, 1), cohort(2, '3', [0, 1, 0], { given: ['2.9', '2.9', '2.9'] })],
    };
    expect(final(design(), deviated)).toMatchObject({ dose: '3', subjectsGiven: 0 });
  });

  it('skips no untested level', () => {
    const rule = { name: 'robbins-monro', c: 12, k0: 0, gamma: 1, carry: 'iterate' } as const;
    const guarded = design({ rule, guardrails: { ...NO_GUARDRAILS, noSkipping: 'tried' } });
    expect(final(guarded, history(['2', [0, 0, 0]]))).toMatchObject({
      rounded: '5',
      reachable: '3',
      dose: '3',
      subjectsGiven: 0,
    });
  });

  it('lies below every closed dose, and says where the estimate does not', () => {
    const rule = { name: 'robbins-monro', c: 0.1, k0: 0, gamma: 1, carry: 'iterate' } as const;
    const guarded = design({ rule, guardrails: { ...NO_GUARDRAILS, projection: wide, closing } });
    expect(final(guarded, history(['2', [1, 1, 0]]))).toMatchObject({
      dose: '1',
      closedFrom: '2',
      aboveOpenDoses: true,
    });
    expect(final({ ...guarded, startingDose: '1' }, history(['1', [1, 1, 0]])).dose).toBeNull();
  });

  it('is missing where there is no estimate, with the reason', () => {
    const logit = design({ finalEstimator: { name: 'logit', firth: false } });
    expect(final(logit, history(['2', [0, 0, 0]]))).toMatchObject({
      dose: null,
      estimate: { reason: 'all-nonresponse' },
    });
  });
});
