import { describe, expect, it } from 'vitest';
import { history, levelsDesign, NO_GUARDRAILS } from '@/tests/designs';
import { compareDesigns, releasedDoses } from './compare-rules';
import { flips } from './flips';
import { cohortOfCounts } from './history';
import { nextSteps, type NextStep } from './next-steps';
import { recommend } from './recommend';
import { freezes, stepSizes } from './step-sizes';

const design = levelsDesign();
const past = history(['2', [0, 0, 1]], ['2', [0, 0, 0]]);

describe('the next-step table', () => {
  it('gives for every number of responses what recommend gives', () => {
    const table = nextSteps(design, past);
    if (!table.ok || table.value === null) throw new Error('There is no table.');
    const now = recommend(design, past);
    const { dose } = table.value;
    expect(now.ok && now.value.dose).toBe(dose);
    expect(table.value.steps).toHaveLength(4);
    table.value.steps.forEach((step, responses) => {
      const outcomes = [0, 1, 2].map((i) => (i < responses ? 1 : 0));
      const cohorts = [
        ...past.cohorts,
        ...history([dose, outcomes]).cohorts.map((c) => ({ ...c, number: 3 })),
      ];
      const direct = recommend(design, { cohorts });
      expect(direct.ok && direct.value).toMatchObject({
        dose: step.dose,
        nextValue: step.nextValue,
        kind: step.kind,
      });
    });
  });

  it('looks ahead over sequences to the depth asked for, each cohort at its recommended dose', () => {
    const table = nextSteps(design, past, { depth: 3, subjects: 2 });
    if (!table.ok || table.value === null) throw new Error('There is no table.');
    const count = (steps: readonly NextStep[]): number =>
      steps.reduce((sum, step) => sum + 1 + count(step.next), 0);
    expect(count(table.value.steps)).toBe(3 + 9 + 27);
  });

  it('has no rows after a stop, and none at all where no dose is left', () => {
    const closing = { priorA: 1, priorB: 1, cutoff: 0.9, minimumEvaluable: 3, scope: 'every-level' } as const;
    const guarded = levelsDesign({ startingDose: '1', guardrails: { ...NO_GUARDRAILS, closing } });
    const table = nextSteps(guarded, { cohorts: [] }, { depth: 2 });
    if (!table.ok || table.value === null) throw new Error('There is no table.');
    expect(table.value.steps[3]).toMatchObject({ kind: 'stop', dose: null, next: [] });
    expect(table.value.steps[0]?.next).toHaveLength(4);
    expect(nextSteps(guarded, history(['1', [1, 1, 1]]))).toEqual({ ok: true, value: null });
  });

  it('takes another dose for the coming cohort, lowered or not', () => {
    const at = (loweredRelease: boolean) => {
      const table = nextSteps(
        levelsDesign({ startingDose: '4' }),
        { cohorts: [] },
        { released: '2', loweredRelease },
      );
      if (!table.ok || table.value === null) throw new Error('There is no table.');
      return table.value.steps.map((step) => step.nextValue);
    };
    expect(at(false)[0]).toBe(5);
    expect(at(true)[0]).toBe(3);
  });

  it('refuses a table too large', () => {
    expect(() => nextSteps(design, past, { depth: 6, subjects: 9 })).toThrow(RangeError);
    expect(() => nextSteps(design, past, { depth: 7 })).toThrow(RangeError);
  });

  it('hands on a history that does not fit', () => {
    expect(nextSteps(design, history(['9', [0]]))).toMatchObject({ ok: false, error: { code: 'history' } });
  });
});

describe('flips', () => {
  it('tells for each subject of the last cohort what the other outcome would give', () => {
    const found = flips(design, past);
    if (!found.ok) throw new Error(found.error.message);
    expect(found.value).toHaveLength(3);
    const other = recommend(design, history(['2', [0, 0, 1]], ['2', [1, 0, 0]]));
    expect(other.ok && found.value[0]).toMatchObject({
      cohort: 2,
      subject: 0,
      response: false,
      dose: other.ok ? other.value.dose : '',
    });
    expect(flips(design, past, 'all-cohorts')).toMatchObject({ ok: true, value: { length: 6 } });
    expect(flips(design, { cohorts: [] })).toEqual({ ok: true, value: [] });
  });
});

describe('comparison of designs on one history', () => {
  it('replays each on the doses really given, whatever its own doses are', () => {
    const other = levelsDesign({
      doses: { kind: 'levels', levels: ['1.5', '2.5', '3.5'] },
      startingDose: '1.5',
      rule: { name: 'virtual-observations', slope: 0.2 },
    });
    const [own, foreign] = compareDesigns(
      [
        { label: 'own', design },
        { label: 'foreign', design: other },
      ],
      past,
    );
    if (!own?.course.ok || !foreign?.course.ok) throw new Error('A course is missing.');
    const now = recommend(design, past);
    expect(now.ok && own.course.value[1]?.dose).toBe(now.ok && now.value.dose);
    expect(foreign.course.value.map((step) => step.cohort)).toEqual([1, 2]);
    // mean dose 2, mean proportion 1/6
    expect(foreign.course.value[1]?.nextValue).toBeCloseTo(2 - (1 / 6 - 0.25) / 0.2, 12);
    expect(releasedDoses(past)).toEqual([
      { cohort: 1, dose: '2' },
      { cohort: 2, dose: '2' },
    ]);
  });
});

describe('step sizes', () => {
  it('shows steps in dose units around a dose', () => {
    const [first, second] = stepSizes(design, '3', 2);
    expect(first).toMatchObject({ k: 1, gain: 4, afterNone: 4, afterAll: 0 });
    expect(second).toMatchObject({ k: 2, gain: 2, afterNone: 3.5, afterAll: 1.5 });
    const log = stepSizes(levelsDesign({ scale: 'log' }), '3', 1)[0];
    expect(log?.doseAfterNone).toBeCloseTo(3 * Math.E, 12);
  });

  it("shows Joseph's gains, which depend on the cohort size", () => {
    const joseph = (cohortSize: number) =>
      stepSizes(
        levelsDesign({
          target: 0.5,
          cohortSize,
          evaluableForRise: 1,
          rule: { name: 'joseph', slope: 1, priorSd: 1 },
        }),
        '3',
        2,
      );
    // FACTS A6, 14 for m = 1; reference 04 (joseph-const-050-m6) for m = 6
    expect(joseph(1)[0]?.gain).toBeCloseTo(1.128379, 6);
    expect(joseph(1)[1]?.gain).toBeCloseTo(0.83885, 6);
    expect(joseph(6)[0]?.gain).toBeCloseTo(2.538853125964904, 12);
  });

  it('moves the other way where the response falls', () => {
    const response = { present: 'a', absent: 'b', kind: 'wanted', direction: 'falling' } as const;
    expect(stepSizes(levelsDesign({ response }), '3', 1)[0]).toMatchObject({ afterNone: 2, afterAll: 6 });
  });

  it('tells from which step on carrying the dose given freezes, as replays show', () => {
    const rule = {
      name: 'robbins-monro',
      c: 4,
      k0: 0,
      gamma: 0.8,
      carry: 'given',
      carryReason: 'test',
    } as const;
    const given = levelsDesign({ rule });
    const [freeze] = freezes(given);
    if (freeze === undefined) throw new Error('There is no freeze.');
    // a_k Γ ≤ 1/2: (4 × 0.25 / 0.5)^(1/0.8) = 2.38; a_k (1 − Γ) ≤ 1/2: 6^(1/0.8) = 9.39
    expect(freeze).toMatchObject({ low: '1', high: '2', noRise: 3, noFall: 10 });
    const level = (cohorts: number, outcome: number) => {
      const doses = Array.from({ length: cohorts }, () => ['2', [outcome, outcome, outcome]] as const);
      const now = recommend(given, history(...doses));
      return now.ok ? now.value.dose : null;
    };
    expect(level(freeze.noRise - 1, 0)).toBe('3');
    expect(level(freeze.noRise, 0)).toBe('2');
    expect(level(freeze.noFall - 1, 1)).toBe('1');
    expect(level(freeze.noFall, 1)).toBe('2');
    expect(freezes(design)).toEqual([]);
  });
});

describe('cohorts from counts', () => {
  it.each([
    [3, 4, ['responses'], /4 responses among 3/],
    [3, 1.5, ['responses'], /whole number/],
    [2.5, 1, ['evaluable'], /whole number/],
    [-1, 0, ['evaluable'], /whole number/],
    [NaN, 0, ['evaluable'], /whole number/],
  ])('refuses %d evaluable with %d responses', (evaluable, responses, path, message) => {
    const refused = cohortOfCounts({ number: 1, released: '2', evaluable, responses });
    if (refused.ok) throw new Error('It was not refused.');
    expect(refused.error.path).toEqual(path);
    expect(refused.error.message).toMatch(message);
  });

  it('lists the subjects', () => {
    const made = cohortOfCounts({ number: 1, released: '2', evaluable: 3, responses: 1 });
    expect(made.ok && made.value.subjects.filter((subject) => subject.response)).toHaveLength(1);
  });
});
