import { describe, expect, it } from 'vitest';
import type { Design, DesignInput } from '@/lib/schemas/design';
import { cohort, history, levelsDesign, NO_GUARDRAILS, NO_STOPPING, rangeDesign } from '@/tests/designs';
import type { History } from './history';
import { recommend, recommendUnder, type Recommendation } from './recommend';
import type { LineId } from './trace/line';

function recommended(design: Design, past: History): Recommendation {
  const result = recommend(design, past);
  if (!result.ok) throw new Error(result.error.message);
  return result.value;
}

function line(recommendation: Recommendation, id: LineId) {
  const found = recommendation.lines.find((entry) => entry.id === id);
  if (found === undefined) throw new Error(`There is no line ${id}.`);
  return found;
}

const guarded = (guardrails: Partial<DesignInput['guardrails']>, more: Partial<DesignInput> = {}) =>
  levelsDesign({ ...more, guardrails: { ...NO_GUARDRAILS, ...guardrails } });

describe('recommend', () => {
  it('gives the starting dose before the first cohort', () => {
    const first = recommended(levelsDesign(), { cohorts: [] });
    expect(first).toMatchObject({ kind: 'dose', dose: '2', afterCohort: 0, stepIndex: 0, carriedValue: 2 });
    expect(line(first, 'starting-dose').result).toEqual({ value: '2', form: 'dose' });
  });

  it('is the same bit for bit when called again, and survives JSON unchanged', () => {
    const past = history(['2', [0, 0, 1]], ['3', [0, 1, 1]]);
    const once = recommended(levelsDesign(), past);
    expect(JSON.stringify(recommended(levelsDesign(), past))).toBe(JSON.stringify(once));
    expect(JSON.parse(JSON.stringify(once))).toEqual(once);
  });

  it('has a line for every step, also where nothing changed', () => {
    const steps = new Set(
      recommended(levelsDesign(), history(['2', [0, 0, 1]])).lines.map((entry) => entry.step),
    );
    expect([...steps].sort()).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8]);
  });

  it('bounds the rise from the lower of released and mean given, and carries the bounded value', () => {
    const design = guarded({ largestRise: { kind: 'step', step: 1 } });
    // raw: 2 + 4 × 0.25 × 3 … with c = 20: 2 + 20 × 0.25 = 7, bound 3
    const steep = { ...design, rule: { ...design.rule, c: 20 } as Design['rule'] };
    const result = recommended(steep, history(['2', [0, 0, 0]]));
    expect(result).toMatchObject({ nextValue: 7, assignedValue: 3, carriedValue: 3, dose: '3' });
    expect(line(result, 'largest-rise')).toMatchObject({
      acted: true,
      reason: { code: 'largest-rise-bounds-value' },
    });
    const deviated = recommended(steep, { cohorts: [cohort(1, '2', [0, 0], { given: ['1', '2'] })] });
    expect(deviated.assignedValue).toBe(2.5);
  });

  it('bounds a fold on the linear scale by the dose itself', () => {
    const design = levelsDesign({
      doses: { kind: 'levels', levels: ['10', '20', '40', '60'] },
      startingDose: '20',
      rule: { name: 'robbins-monro', c: 400, k0: 0, gamma: 1, carry: 'iterate' },
      guardrails: { ...NO_GUARDRAILS, largestRise: { kind: 'fold', factor: 2 } },
    });
    expect(recommended(design, history(['20', [0, 0, 0]]))).toMatchObject({ assignedValue: 40, dose: '40' });
  });

  it('takes the highest dose within the largest rise where rounding went above it', () => {
    // bound 2 + 0.6 rounds to 3, which breaks it; the highest dose within is 2
    const design = rangeDesign({
      rule: { name: 'robbins-monro', c: 40, k0: 0, gamma: 1, carry: 'iterate' },
      doses: { kind: 'range', lowest: '1', highest: '9', increment: '1' },
      startingDose: '2',
      guardrails: { ...NO_GUARDRAILS, largestRise: { kind: 'step', step: 1.6 } },
    });
    const result = recommended(design, history(['2', [0, 0]]));
    expect(result).toMatchObject({ assignedValue: 3.6, dose: '3' });
    expect(result.lines.some((entry) => entry.reason?.code === 'largest-rise-bounds-dose')).toBe(true);
  });

  it('projects to the ends of the doses, or to those set', () => {
    const down = recommended(levelsDesign(), history(['2', [1, 1, 1]]));
    expect(down).toMatchObject({ nextValue: -1, assignedValue: 1, dose: '1' });
    expect(line(down, 'projection')).toMatchObject({ acted: true, reason: { code: 'projected-up' } });
    const wide = guarded({ projection: { lowest: -5, highest: 9 } });
    expect(recommended(wide, history(['2', [1, 1, 1]]))).toMatchObject({ carriedValue: -1, dose: '1' });
  });

  it('sends ties to the lower dose, or to the higher where a wanted response gives the reason', () => {
    const rule = { name: 'robbins-monro', c: 2, k0: 0, gamma: 1, carry: 'iterate' } as const;
    const past = history(['2', [0, 0, 0, 0]]);
    const tie = recommended(levelsDesign({ rule }), past);
    expect(tie).toMatchObject({ nextValue: 2.5, dose: '2' });
    expect(line(tie, 'nearest').reason?.code).toBe('tie-lower');
    const wanted = levelsDesign({
      rule,
      response: { present: 'block', absent: 'no block', kind: 'wanted', direction: 'rising' },
      guardrails: { ...NO_GUARDRAILS, ties: 'higher', tiesReason: 'efficacy first' },
    });
    expect(recommended(wanted, past).dose).toBe('3');
  });

  it('skips no untested level: from the highest tried, or from the current', () => {
    const rule = { name: 'robbins-monro', c: 20, k0: 0, gamma: 1, carry: 'iterate' } as const;
    expect(recommended(guarded({ noSkipping: 'tried' }, { rule }), history(['2', [0, 0, 0]])).dose).toBe('3');
    const past = history(['3', [1, 1, 1]], ['1', [0, 0, 0]]);
    const roaming = { ...rule, c: 40 };
    const start = { startingDose: '3' };
    expect(recommended(guarded({ noSkipping: 'tried' }, { rule: roaming, ...start }), past).dose).toBe('4');
    expect(recommended(guarded({ noSkipping: 'current' }, { rule: roaming, ...start }), past).dose).toBe('2');
  });

  it('opens no level by an accidental overdose', () => {
    const rule = { name: 'robbins-monro', c: 20, k0: 0, gamma: 1, carry: 'iterate' } as const;
    const design = guarded({ noSkipping: 'tried' }, { rule });
    const overdosed = { cohorts: [cohort(1, '2', [0, 0, 0], { given: ['5', '2', '2'] })] };
    expect(recommended(design, overdosed).dose).toBe('3');
    const underdosed = { cohorts: [cohort(1, '2', [0, 0, 0], { given: ['1', '1', '1'] })] };
    expect(recommended(design, underdosed).dose).toBe('2');
  });

  it('does not rise after a proportion at or above the target, equality included', () => {
    const rule = { name: 'virtual-observations', slope: 0.1 } as const;
    const at = history(['1', [0, 0, 0, 0]], ['1', [0, 0, 0, 0]], ['1', [1, 0, 0, 0]]);
    const design = (coherence: 'off' | 'one-way') =>
      guarded({ coherence }, { rule, startingDose: '1', cohortSize: 4, evaluableForRise: 4 });
    expect(recommended(design('off'), at).dose).not.toBe('1');
    const kept = recommended(design('one-way'), at);
    expect(kept.dose).toBe('1');
    expect(line(kept, 'coherence')).toMatchObject({ acted: true, after: { value: '1' } });
  });

  it('does not fall below the current dose after a response where responses fall with dose', () => {
    const response = { present: 'a', absent: 'b', kind: 'wanted', direction: 'falling' } as const;
    const design = (coherence: DesignInput['guardrails']['coherence']) =>
      guarded({ coherence, projection: { lowest: -9, highest: 9 } }, { response });
    // values 2, 1, 0.5, 0.167, then up by 0.75 to 0.917: level 1, though the current level is 2
    const past = history(['2', [0, 0, 0]], ['1', [0, 0, 0]], ['1', [0, 0, 0]], ['2', [1, 1, 1]]);
    expect(recommended(design('off'), past).dose).toBe('1');
    expect(recommended(design('one-way'), past).dose).toBe('2');
  });

  it('rises only with enough evaluable subjects', () => {
    const past = history(['2', [0, 0]]);
    expect(recommended(levelsDesign({ evaluableForRise: 2 }), past).dose).toBe('3');
    const few = recommended(levelsDesign({ evaluableForRise: 3 }), past);
    expect(few.dose).toBe('2');
    expect(line(few, 'evaluable')).toMatchObject({ acted: true, reason: { code: 'too-few-evaluable' } });
  });

  const closing = {
    priorA: 1,
    priorB: 1,
    cutoff: 0.9,
    minimumEvaluable: 3,
    scope: 'every-level',
  } as const;

  it('closes a level and all above, and holds the carried value at the highest open dose', () => {
    // Beta(1,1), cutoff 0.90, Γ = 0.25: 2 of 3 close (FACTS A6, 22)
    const slow = { name: 'robbins-monro', c: 0.1, k0: 0, gamma: 1, carry: 'iterate' } as const;
    const closed = recommended(guarded({ closing }, { rule: slow }), history(['2', [1, 1, 0]]));
    expect(closed).toMatchObject({ kind: 'dose', dose: '1', closedFrom: '2', carriedValue: 1 });
    expect(line(closed, 'closed')).toMatchObject({ acted: true, reason: { code: 'closed' } });
    const open = recommended(
      guarded({ closing: { ...closing, cutoff: 0.95 } }, { rule: slow }),
      history(['2', [1, 1, 0]]),
    );
    expect(open).toMatchObject({ dose: '2', closedFrom: null });
  });

  it('stops where the lowest level is closed', () => {
    const past = history(['1', [1, 1, 0]]);
    const stopped = recommended(guarded({ closing }, { startingDose: '1' }), past);
    expect(stopped).toMatchObject({ kind: 'stop', dose: null, stopReasons: ['closed-all'] });
    const lowestOnly = guarded({ closing: { ...closing, scope: 'lowest-level' } });
    expect(recommended(lowestOnly, history(['2', [1, 1, 1]])).closedFrom).toBeNull();
  });

  it('closes a dose given on a range by all subjects given at most it', () => {
    const harm = { present: 'a', absent: 'b', kind: 'harm', direction: 'rising' } as const;
    const design = rangeDesign({
      response: harm,
      target: 0.25,
      startingDose: '20',
      rule: { name: 'robbins-monro', c: 0.5, k0: 0, gamma: 1, carry: 'iterate' },
      guardrails: {
        ...NO_GUARDRAILS,
        largestRise: { kind: 'step', step: 5 },
        closing: { ...closing, minimumEvaluable: 4 },
      },
    });
    // 19.5 given: 0 of 2; 20 given: 4 of 4; pooled up to 20: 4 of 6; the value 19.94 would round to 20
    const past = history(['19.5', [0, 0]], ['20', [1, 1, 1, 1]]);
    expect(recommended(design, past)).toMatchObject({ closedFrom: '20', kind: 'dose', dose: '19.5' });
    const off = { cohorts: [cohort(1, '20', [1, 1, 1, 1], { given: ['19.8', '19.8', '19.8', '19.8'] })] };
    expect(recommended(design, off)).toMatchObject({ closedFrom: '20', dose: '19.5' });
  });

  it('stops a falling harm where the highest level meets the criterion', () => {
    const response = { present: 'a', absent: 'b', kind: 'harm', direction: 'falling' } as const;
    const design = guarded({ closing }, { response, startingDose: '5' });
    expect(recommended(design, history(['5', [1, 1, 1]]))).toMatchObject({ kind: 'stop', dose: null });
    expect(recommended(design, history(['4', [1, 1, 1]]))).toMatchObject({ kind: 'dose' });
  });

  it('names all reasons to stop that hold, in order, and still tells the dose that would follow', () => {
    const design = levelsDesign({
      maximumCohorts: 2,
      stopping: { maximumSubjects: 8, repeated: { times: 2, subjects: 3 }, precision: null },
      rule: { name: 'robbins-monro', c: 0.1, k0: 0, gamma: 1, carry: 'iterate' },
    });
    const past = history(['2', [0, 0, 1]], ['2', [0, 1, 0]]);
    expect(recommended(design, past)).toMatchObject({
      kind: 'stop',
      dose: '2',
      stopReasons: ['maximum-cohorts', 'maximum-subjects', 'repeated'],
    });
  });

  it('counts the repeated rule from the first recommendation after the start', () => {
    const rule = { name: 'robbins-monro', c: 0.1, k0: 0, gamma: 1, carry: 'iterate' } as const;
    const design = levelsDesign({ rule, stopping: { ...NO_STOPPING, repeated: { times: 2, subjects: 1 } } });
    expect(recommended(design, history(['2', [0, 0, 1]])).stopReasons).toEqual([]);
    expect(recommended(design, history(['2', [0, 0, 1]], ['2', [0, 0, 1]])).stopReasons).toEqual([
      'repeated',
    ]);
  });

  it('stops for precision once the interval is narrow enough', () => {
    const design = rangeDesign({
      target: 0.5,
      rule: { name: 'robbins-monro', c: 10, k0: 0, gamma: 1, carry: 'iterate' },
      stopping: {
        ...NO_STOPPING,
        precision: { estimator: 'logit-delta', level: 0.8, width: 30, minimumSubjects: 8 },
      },
    });
    const wide = (width: number): Design => ({
      ...design,
      stopping: { ...design.stopping, precision: { ...design.stopping.precision!, width } },
    });
    const past = history(['10', [0, 0]], ['15', [0, 1]], ['20', [1, 0]], ['25', [1, 1]]);
    expect(recommended(wide(30), past).stopReasons).toEqual(['precision']);
    expect(recommended(wide(1), past).stopReasons).toEqual([]);
    expect(recommended(wide(30), { cohorts: past.cohorts.slice(0, 3) }).stopReasons).toEqual([]);
  });

  it('lets the last recommendation stand after a cohort without an evaluable subject', () => {
    const before = recommended(levelsDesign(), history(['2', [0, 0, 0]]));
    const after = recommended(levelsDesign(), history(['2', [0, 0, 0]], ['3', []]));
    expect(after).toMatchObject({ dose: before.dose, stepIndex: 1, afterCohort: 2, stands: true });
    expect(after.carriedValue).toBe(before.carriedValue);
    const later = recommended(levelsDesign(), history(['2', [0, 0, 0]], ['3', []], ['3', [0, 0, 1]]));
    const without = recommended(levelsDesign(), history(['2', [0, 0, 0]], ['3', [0, 0, 1]]));
    expect(later.carriedValue).toBe(without.carriedValue);
    const none = recommended(levelsDesign(), history(['2', []]));
    expect(none).toMatchObject({ dose: '2', stands: true, stepIndex: 0 });
  });

  it('stops at the maximum of cohorts also when the last had no evaluable subject', () => {
    const design = levelsDesign({ maximumCohorts: 2 });
    expect(recommended(design, history(['2', [0, 0, 0]], ['3', []])).stopReasons).toEqual([
      'maximum-cohorts',
    ]);
  });

  it('starts from the lower value after a lowered release, and the trace says so', () => {
    const rule = { name: 'robbins-monro', c: 1, k0: 0, gamma: 1, carry: 'iterate' } as const;
    const design = levelsDesign({ rule, startingDose: '4' });
    const lowered = recommended(design, { cohorts: [cohort(1, '2', [0, 0, 0], { lowered: true })] });
    expect(lowered.nextValue).toBe(2.25);
    expect(line(lowered, 'start')).toMatchObject({
      reason: { code: 'lowered-release' },
      before: { value: 4 },
    });
    const deviated = recommended(design, { cohorts: [cohort(1, '2', [0, 0, 0])] });
    expect(deviated.nextValue).toBe(4.25);
  });
});

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
    expect(recommended(design, history(['2.0000000000', [0, 0, 0]])).dose).toBe('3');
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
