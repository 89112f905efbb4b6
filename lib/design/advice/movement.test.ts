import { describe, expect, it } from 'vitest';
import { designSchema, type Design, type RuleSettings } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { compileDesign, newTrial } from '../compiled';
import { doseSetOf } from '../dose-set';
import { cohortOfCounts, type CohortHistory } from '../history';
import { recommend } from '../recommend';
import { replay } from '../replay';
import { completeCohort } from '../step';
import { PLACE } from '../trial-state';
import { givenFreeze, movement, runAhead, stepAdvice } from './movement';
import { settlingLevels } from './settling';

const robbinsMonro: RuleSettings = {
  name: 'robbins-monro',
  c: 6,
  k0: 0,
  gamma: 1,
  carry: 'iterate',
  carryReason: null,
};

/** Levels 1 to 5 on the linear scale, no guardrail but the doses themselves, unless changed. */
function levelsDesign(changes: Partial<Design> = {}): Design {
  const base = designDefaults('levels');
  return designSchema.parse({
    ...base,
    doses: { kind: 'levels', levels: ['1', '2', '3', '4', '5'] },
    startingDose: '3',
    scale: 'linear',
    target: 0.25,
    response: { ...base.response, kind: 'wanted' },
    rule: robbinsMonro,
    cohortSize: 3,
    maximumCohorts: 12,
    stopping: { maximumSubjects: null, repeated: null, precision: null },
    guardrails: {
      ...base.guardrails,
      largestRise: null,
      noSkipping: 'off',
      coherence: 'off',
      closing: null,
    },
    ...changes,
  });
}

function cohort(number: number, released: string, evaluable: number, responses: number): CohortHistory {
  const result = cohortOfCounts({ number, released, evaluable, responses });
  if (!result.ok) throw new Error(result.error.message);
  return result.value;
}

describe('stepAdvice', () => {
  it('Robbins–Monro: moves are a_k Γ and −a_k(1 − Γ)', () => {
    stepAdvice(levelsDesign()).forEach((advice, i) => {
      const a = 6 / (i + 1);
      expect(advice.step).toBe(i + 1);
      expect(advice.moveNoResponses).toBeCloseTo(a * 0.25, 12);
      expect(advice.moveAllResponses).toBeCloseTo(-a * 0.75, 12);
      expect(advice.doseMoveNoResponses).toBeCloseTo(a * 0.25, 12);
    });
  });

  it('counts cohorts until the summed gains pass half the gap, frozen when more than remain', () => {
    const design = levelsDesign({ maximumCohorts: 40 });
    stepAdvice(design).forEach(({ step, noResponses, allResponses }) => {
      // A fall of exactly half the gap is a tie, which goes to the lower dose; a rise of exactly half is none.
      const needed = (share: number, half: number) => {
        let moved = 0;
        for (let n = 1; n <= 40 - step + 1; n++) {
          moved += (6 / (step + n - 1)) * share;
          if (moved > half) return n;
        }
        return null;
      };
      expect(noResponses.cohorts).toBe(needed(0.25, 0.5 + 1e-9));
      expect(allResponses.cohorts).toBe(needed(0.75, 0.5 - 1e-9));
      expect(noResponses.frozen).toBe(needed(0.25, 0.5 + 1e-9) === null);
    });
    // At k = 40 one cohort is left and moves 6/40 · 0.25 of a gap.
    expect(stepAdvice(design)[39]?.noResponses).toMatchObject({
      cohorts: null,
      to: null,
      frozen: true,
      stops: false,
    });
  });

  it('virtual observations: moves are e/(kb)', () => {
    const design = levelsDesign({ rule: { name: 'virtual-observations', slope: 0.2, carryBounds: null } });
    stepAdvice(design).forEach((advice, i) => {
      expect(advice.moveNoResponses).toBeCloseTo(0.25 / (0.2 * (i + 1)), 9);
      expect(advice.moveAllResponses).toBeCloseTo(-0.75 / (0.2 * (i + 1)), 9);
    });
  });

  it('on the log scale moves multiply the dose', () => {
    const design = levelsDesign({ scale: 'log', rule: { ...robbinsMonro, c: 2 } as RuleSettings });
    const [first] = stepAdvice(design, '2');
    expect(first?.doseMoveNoResponses).toBeCloseTo(2 * Math.exp(0.5) - 2, 10);
  });

  it('where response falls with dose, responses raise it', () => {
    const base = levelsDesign();
    const design = levelsDesign({ response: { ...base.response, direction: 'falling' } });
    const [first] = stepAdvice(design);
    expect(first?.moveAllResponses).toBeCloseTo(4.5, 12);
    expect(first?.allResponses.to).toBe('5');
  });

  it('every rule can be asked', () => {
    const rules: RuleSettings[] = [
      { ...robbinsMonro, name: 'kesten' } as RuleSettings,
      { name: 'joseph', slope: 0.6, priorSd: 1.5 },
      {
        name: 'adaptive-slope',
        form: 'mean',
        initialSlope: 0.2,
        slopeLow: 0.05,
        slopeHigh: 1,
        weighted: false,
        carry: 'iterate',
        carryReason: null,
      },
      { name: 'logit-ml', firth: true, c: 5, largestMove: 2 },
    ];
    for (const rule of rules) {
      const [first] = stepAdvice(levelsDesign({ rule }));
      expect(first?.moveAllResponses).toBeLessThan(0);
      expect(first?.moveNoResponses).toBeGreaterThan(0);
    }
  });
});

describe('movement', () => {
  it('agrees with recommending along the imagined history', () => {
    const design = levelsDesign();
    const history = {
      cohorts: [cohort(1, '3', 3, 1), cohort(2, '3', 3, 0), cohort(3, '4', 3, 1), cohort(4, '4', 3, 1)],
    };
    const replayed = replay([{ fromCohort: 1, design }], history);
    if (!replayed.ok) throw new Error(replayed.error.message);
    const { compiled, trial } = replayed.value;
    const got = movement(compiled, trial);
    for (const [responses, expected] of [
      [3, got.allResponses],
      [0, got.noResponses],
    ] as const) {
      const cohorts = [...history.cohorts];
      const doseAfter = () => {
        const result = recommend(design, { cohorts });
        if (!result.ok) throw new Error(result.error.message);
        return result.value.dose as string;
      };
      const before = doseAfter();
      let after = before;
      let n = 0;
      while (after === before && n < 8) {
        n++;
        cohorts.push(cohort(cohorts.length + 1, before, 3, responses));
        after = doseAfter();
      }
      expect(expected).toMatchObject({ cohorts: n, to: after, frozen: false });
    }
  });

  it('leaves the state as it was', () => {
    const compiled = compileDesign(levelsDesign());
    const trial = newTrial(compiled);
    const before = JSON.stringify([trial.cohorts, [...trial.rule], [...trial.place]]);
    movement(compiled, trial);
    expect(JSON.stringify([trial.cohorts, [...trial.rule], [...trial.place]])).toBe(before);
  });

  it('says when another stopping rule ends the trial first', () => {
    const design = levelsDesign({
      rule: { ...robbinsMonro, c: 0.01 } as RuleSettings,
      stopping: { maximumSubjects: null, repeated: { times: 3, subjects: 6 }, precision: null },
    });
    const compiled = compileDesign(design);
    const ahead = runAhead(compiled, newTrial(compiled), newTrial(compiled), false);
    expect(ahead).toEqual({ cohorts: null, to: null, frozen: true, stops: true });
  });

  it('a closed level counts as a change', () => {
    const base = levelsDesign();
    const design = levelsDesign({
      rule: { ...robbinsMonro, c: 0.01 } as RuleSettings,
      response: { ...base.response, kind: 'harm' },
      guardrails: {
        ...base.guardrails,
        closing: { priorA: 1, priorB: 1, cutoff: 0.95, minimumEvaluable: 3, scope: 'every-level' },
      },
    });
    const compiled = compileDesign(design);
    expect(runAhead(compiled, newTrial(compiled), newTrial(compiled), true)).toMatchObject({
      cohorts: 1,
      to: '2',
    });
  });
});

it('givenFreeze: the first k at which a cohort moves no more than half the gap', () => {
  // 6/k · 0.25 ≤ 0.5 from k = 3, 6/k · 0.75 ≤ 0.5 from k = 9.
  expect(givenFreeze((k) => 6 / k, 0.25, 1, 12)).toEqual({ noRiseFrom: 3, noFallFrom: 9 });
  expect(givenFreeze((k) => 6 / k, 0.25, 1, 12, -1)).toEqual({ noRiseFrom: 9, noFallFrom: 3 });
  expect(givenFreeze((k) => 6 / k, 0.25, 1, 8)).toEqual({ noRiseFrom: 3, noFallFrom: null });
});

describe('settlingLevels', () => {
  const truth = [0.05, 0.1, 0.2, 0.3, 0.5];
  const doses = doseSetOf({ kind: 'levels', levels: ['1', '2', '3', '4', '5'] }, 'linear');
  const settle = (b: number, p = truth) =>
    settlingLevels(doses, (i) => p[i] as number, 0.25, b).map((level) => level.dose);

  it('by hand', () => {
    expect(settle(1 / 5)).toEqual(['3', '4']);
    expect(settle(1 / 8)).toEqual(['3', '4']);
    // (0.25 − 0.2)·10 is half the gap, not below it
    expect(settle(1 / 10.001)).toEqual([]);
    expect(settle(1 / 8, [0.25, 0.4, 0.5, 0.6, 0.7])).toEqual(['1']);
  });

  it('are the levels that stay when every cohort has exactly its expected proportion', () => {
    for (const direction of ['rising', 'falling'] as const) {
      const base = levelsDesign();
      const p = direction === 'rising' ? truth : [...truth].reverse();
      for (const slope of [0.45, 0.2, 0.125, 0.09, 0.05]) {
        const rule: RuleSettings = { name: 'virtual-observations', slope, carryBounds: null };
        const sign = direction === 'rising' ? 1 : -1;
        const levels = settlingLevels(doses, (i) => p[i] as number, 0.25, slope, sign).map(
          (level) => level.index,
        );
        const staying = p.flatMap((probability, index) => {
          const design = levelsDesign({
            rule,
            startingDose: doses.dose(index),
            response: { ...base.response, direction },
          });
          const compiled = compileDesign(design);
          const trial = newTrial(compiled);
          for (let k = 0; k < 10; k++) {
            trial.beginCohort();
            trial.addSubjects(doses.working(index), 3, 3 * probability);
            completeCohort(compiled, trial, doses.working(index), false);
            if (trial.place[PLACE.FINAL] !== index) return [];
          }
          return [index];
        });
        expect(staying).toEqual(levels);
      }
    }
  });
});
