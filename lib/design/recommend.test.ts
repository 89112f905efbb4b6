import { describe, expect, it } from 'vitest';
import type { Design, DesignInput } from '@/lib/schemas/design';
import { cohort, history, levelsDesign, NO_GUARDRAILS, NO_STOPPING, rangeDesign } from '@/tests/designs';
import type { History } from './history';
import { recommend, type Recommendation } from './recommend';
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
