import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import type { Outcome } from '../ui/outcome-mark';
import type { CourseData, CourseShapes, CourseText } from './course-data';
import { textWidth } from './course-labels';
import { roundDoses } from './course-scale';
import { courseShapes } from './course-shapes';
import { courseInWords, estimateInWords } from './course-words';

const outcomes = (present: number, absent: number): Outcome[] => [
  ...Array.from({ length: absent }, () => 'absent' as const),
  ...Array.from({ length: present }, () => 'present' as const),
];

/** The invented trial of the project's drawing of the review page. */
const drawn: CourseData = {
  unit: 'mg',
  scale: 'log',
  levels: ['10', '20', '40', '60', '90', '120'],
  labels: { present: 'dose-limiting toxicity', absent: 'none' },
  cohorts: [
    { number: 1, dose: '10', state: 'signed', marks: outcomes(0, 3) },
    { number: 2, dose: '20', state: 'signed', marks: outcomes(0, 3) },
    { number: 3, dose: '40', state: 'signed', marks: outcomes(1, 2) },
    { number: 4, dose: '40', state: 'signed', marks: outcomes(0, 3) },
    { number: 5, dose: '60', state: 'under-review', marks: outcomes(1, 2) },
  ],
  proposed: { number: 6, dose: '60' },
  estimate: { dose: 47, low: 22, high: 97, coverage: 0.8 },
};

/** Room a text takes, with its usual height of 12 px. */
function box({ x, y, text, anchor, strong }: CourseText) {
  const width = textWidth(text, strong);
  const from = anchor === 'end' ? x - width : anchor === 'middle' ? x - width / 2 : x;
  return { from, to: from + width, top: y - 10, low: y + 2 };
}
function overlaps(a: CourseText, b: CourseText): boolean {
  const [one, two] = [box(a), box(b)];
  return one.from < two.to && two.from < one.to && one.top < two.low && two.top < one.low;
}
function overlapping(texts: readonly CourseText[]): string[] {
  return texts.flatMap((one, index) =>
    texts
      .slice(index + 1)
      .filter((two) => overlaps(one, two))
      .map((two) => `${one.text} | ${two.text}`),
  );
}

describe('the course of the project’s drawing', () => {
  const shapes = courseShapes(drawn);

  // Source: the coordinates in the drawing of the review page (its viewBox is 900 by 190), to a tenth.
  it('stands where it was drawn', () => {
    expect(shapes.grid.map(({ y }) => y)).toEqual(
      [160.0, 125.1, 90.3, 69.9, 49.5, 35.0].map((y) => expect.closeTo(y, 0.9)),
    );
    for (const [index, y] of [160.0, 125.1, 90.3, 69.9, 49.5, 35.0].entries()) {
      expect(Math.abs((shapes.grid[index]?.y ?? 0) - y)).toBeLessThan(0.06);
    }
    expect(Math.abs((shapes.water?.y ?? 0) - 82.4)).toBeLessThan(0.3);
    expect(Math.abs((shapes.water?.band?.y ?? 0) - 45.5)).toBeLessThan(0.6);
    expect(Math.abs((shapes.water?.band?.height ?? 0) - 73.8)).toBeLessThan(1.2);
    expect([shapes.width, shapes.height]).toEqual([900, 190]);
    expect(shapes.released[0]).toEqual([70, 160]);
    expect(shapes.released.at(-1)?.[0]).toBe(670);
    expect(shapes.proposed.at(-1)?.[0]).toBe(790);
    expect(shapes.marks.slice(0, 3).map(({ x, y }) => [x, y])).toEqual([
      [105, 151],
      [130, 151],
      [155, 151],
    ]);
  });

  it('names the doses, the cohorts, the current one with its state, and the estimate', () => {
    expect(shapes.doseLabels.map(({ text }) => text)).toEqual(['10 mg', '20', '40', '60', '90', '120']);
    expect(shapes.cohortLabels.map(({ text, strong }) => [text, strong ?? false])).toEqual([
      ['cohort 1', false],
      ['2', false],
      ['3', false],
      ['4', false],
      ['5 · under review', true],
      ['6 proposed', false],
    ]);
    expect(shapes.water?.label.text).toBe('estimate 47 mg, 80 % interval 22 to 97');
  });

  it('fills the marks of present outcomes and no others', () => {
    const filled = shapes.marks.filter(({ outcome }) => outcome === 'present');
    expect(filled.map(({ x, radius }) => [x, radius])).toEqual([
      [395, 6],
      [635, 6],
    ]);
    expect(shapes.marks).toHaveLength(15);
  });

  it('is told in words', () => {
    expect(courseInWords(drawn)).toBe(
      'Course of doses: cohort 1 at 10 mg (0 of 3 dose-limiting toxicity); ' +
        'cohort 2 at 20 mg (0 of 3 dose-limiting toxicity); cohort 3 at 40 mg (1 of 3 dose-limiting toxicity); ' +
        'cohort 4 at 40 mg (0 of 3 dose-limiting toxicity); ' +
        'cohort 5 at 60 mg, under review (1 of 3 dose-limiting toxicity); 60 mg proposed for cohort 6; ' +
        'estimate 47 mg, 80 % interval 22 to 97.',
    );
  });
});

describe('a course cut to what its reader may see', () => {
  it('shows doses alone: no mark, no proposed step, no estimate, no outcome in its words', () => {
    const cut: CourseData = {
      unit: 'mg',
      scale: 'log',
      levels: drawn.levels,
      cohorts: drawn.cohorts.map(({ number, dose, state }) => ({ number, dose, state })),
    };
    const shapes = courseShapes(cut);
    expect(shapes.marks).toEqual([]);
    expect(shapes.proposed).toEqual([]);
    expect(shapes.water).toBeUndefined();
    expect(courseInWords(cut)).not.toMatch(/of 3|proposed|estimate/);
  });
});

describe('courses at the edges', () => {
  it('draws a trial that has not begun', () => {
    const shapes = courseShapes({
      ...drawn,
      cohorts: [],
      proposed: { number: 1, dose: '10' },
      estimate: undefined,
    });
    expect(shapes.released).toEqual([]);
    expect(shapes.proposed).toEqual([
      [70, 160],
      [190, 160],
    ]);
  });

  it('keeps an estimate beyond the levels at the edge, and its true value in the words', () => {
    const beyond = { ...drawn, estimate: { dose: 400 } };
    expect(courseShapes(beyond).water?.y).toBe(35);
    expect(estimateInWords(beyond)).toBe('estimate 400 mg');
  });

  it('puts a single dose in the middle instead of dividing by nothing', () => {
    const one = courseShapes({
      unit: 'mg',
      scale: 'linear',
      levels: ['5'],
      cohorts: [{ number: 1, dose: '5', state: 'open' }],
    });
    expect(one.released.every(([x, y]) => Number.isFinite(x) && y === 97.5)).toBe(true);
  });

  it('refuses a dose that has no place on a log scale', () => {
    expect(() => courseShapes({ ...drawn, levels: ['0', '10'] })).toThrow(
      new RangeError('The dose 0 has no place on a log scale.'),
    );
  });

  it('names round doses of a range', () => {
    expect(roundDoses(0.5, 40, 'log')).toEqual([0.5, 1, 2, 5, 10, 20, 40]);
    expect(roundDoses(5, 40, 'linear')).toEqual([5, 10, 20, 30, 40]);
    expect(roundDoses(0.1, 0.3, 'linear')).toEqual([0.1, 0.15, 0.2, 0.25, 0.3]);
  });
});

/** Any course: up to 50 levels, 80 cohorts of up to 12, on either scale, with or without what few may see. */
const anyCourse: fc.Arbitrary<CourseData> = fc
  .record({
    scale: fc.constantFrom('linear' as const, 'log' as const),
    levels: fc.uniqueArray(fc.integer({ min: 1, max: 9999 }), { minLength: 1, maxLength: 50 }),
    steps: fc.array(
      fc.record({
        level: fc.nat(49),
        state: fc.constantFrom('signed', 'cancelled', 'open', 'under-review'),
        marks: fc.option(
          fc.array(fc.constantFrom<Outcome>('present', 'absent', 'not-evaluable', 'pending'), {
            maxLength: 12,
          }),
          { nil: undefined },
        ),
      }),
      { maxLength: 80 },
    ),
    proposed: fc.option(fc.nat(49), { nil: undefined }),
    estimate: fc.option(
      fc.record({
        dose: fc.integer({ min: 1, max: 20_000 }),
        spread: fc.double({ min: 1.1, max: 9, noNaN: true }),
      }),
      { nil: undefined },
    ),
  })
  .map(({ scale, levels, steps, proposed, estimate }) => {
    const rising = [...levels].sort((a, b) => a - b);
    const doseOf = (level: number) => String(rising[level % rising.length]);
    return {
      unit: 'mg',
      scale,
      levels: rising.map(String),
      cohorts: steps.map(({ level, state, marks }, index) => ({
        number: index + 1,
        dose: doseOf(level),
        state,
        marks,
      })),
      proposed: proposed === undefined ? undefined : { number: steps.length + 1, dose: doseOf(proposed) },
      estimate: estimate
        ? {
            dose: estimate.dose,
            low: estimate.dose / estimate.spread,
            high: estimate.dose * estimate.spread,
            coverage: 0.8,
          }
        : undefined,
    };
  });

function places(shapes: CourseShapes): [number, number][] {
  return [
    ...shapes.released.map(([x, y]): [number, number] => [x, y]),
    ...shapes.proposed.map(([x, y]): [number, number] => [x, y]),
    ...shapes.grid.flatMap(({ x1, x2, y }): [number, number][] => [
      [x1, y],
      [x2, y],
    ]),
  ];
}

describe('any course', () => {
  it('has every step inside the plane, and one step a cohort', () => {
    check(
      fc.property(anyCourse, (data) => {
        const shapes = courseShapes(data);
        for (const [x, y] of places(shapes)) {
          expect(x >= 0 && x <= shapes.width && y >= 0 && y <= shapes.height).toBe(true);
        }
        expect(shapes.released).toHaveLength(2 * data.cohorts.length);
      }),
    );
  });

  it('is higher wherever its dose is higher', () => {
    check(
      fc.property(anyCourse, (data) => {
        const { released } = courseShapes(data);
        data.cohorts.forEach(({ dose }, index) => {
          data.cohorts.forEach((other, second) => {
            const [here, there] = [released[2 * index]?.[1] ?? 0, released[2 * second]?.[1] ?? 0];
            if (Number(dose) > Number(other.dose)) expect(here).toBeLessThan(there);
            if (Number(dose) === Number(other.dose)) expect(here).toBe(there);
          });
        });
      }),
      30,
    );
  });

  it('never sets one name over another, and always names the ends and the current cohort', () => {
    check(
      fc.property(anyCourse, (data) => {
        const shapes = courseShapes(data);
        expect(overlapping(shapes.doseLabels)).toEqual([]);
        expect(overlapping(shapes.cohortLabels)).toEqual([]);
        expect(shapes.doseLabels[0]?.text).toBe(`${data.levels?.[0]} mg`);
        expect(shapes.doseLabels.at(-1)?.text.startsWith(String(data.levels?.at(-1)))).toBe(true);
        if (data.cohorts.length > 0) expect(shapes.cohortLabels.some(({ strong }) => strong)).toBe(true);
      }),
    );
  });

  it('draws one mark a subject, beside the others of its cohort and above its step', () => {
    check(
      fc.property(anyCourse, (data) => {
        const { marks, released } = courseShapes(data);
        let next = 0;
        data.cohorts.forEach((cohort, index) => {
          const own = marks.slice(next, next + (cohort.marks?.length ?? 0));
          next += own.length;
          expect(own.map(({ outcome }) => outcome)).toEqual([...(cohort.marks ?? [])]);
          const [from, to] = [released[2 * index], released[2 * index + 1]];
          for (const mark of own) {
            expect(mark.x > (from?.[0] ?? 0) && mark.x < (to?.[0] ?? 0)).toBe(true);
            expect(mark.y).toBeLessThan(from?.[1] ?? 0);
          }
          own.forEach((one, first) =>
            own.slice(first + 1).forEach((two) => {
              expect(Math.hypot(one.x - two.x, one.y - two.y)).toBeGreaterThanOrEqual(12);
            }),
          );
        });
        expect(next).toBe(marks.length);
      }),
    );
  });

  it('keeps the estimate’s text inside the plane and off the steps and marks', () => {
    check(
      fc.property(anyCourse, (data) => {
        const { water, marks, width } = courseShapes(data);
        if (!water) return;
        const text = box(water.label);
        expect(text.from).toBeGreaterThanOrEqual(0);
        expect(text.to).toBeLessThanOrEqual(width);
        const touched = marks.filter(
          (mark) =>
            mark.x + 6 > text.from && mark.x - 6 < text.to && mark.y + 6 > text.top && mark.y - 6 < text.low,
        );
        expect(touched).toEqual([]);
      }),
    );
  });
});
