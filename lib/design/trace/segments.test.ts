import { describe, expect, it } from 'vitest';
import { cohort, history, levelsDesign, NO_GUARDRAILS, rangeDesign } from '@/tests/designs';
import type { Design, DesignInput } from '@/lib/schemas/design';
import type { History } from '../history';
import { recommend } from '../recommend';
import { computedDigits, computedDoseDigits, doseSegments, printContext, segmentsText } from './format';
import { computed, exact, exactDose } from './line';
import { printLine, templateSegments } from './segments';

const context = printContext(levelsDesign());

function printed(design: Design, past: History): string[] {
  const result = recommend(design, past);
  if (!result.ok) throw new Error(result.error.message);
  const print = printContext(design);
  return result.value.lines.map((line) => {
    const { step, label, formula, result: end, note } = printLine(line, print);
    return [step, segmentsText(label), segmentsText(formula), segmentsText(end), note && segmentsText(note)]
      .filter((part) => part !== null && part !== '')
      .join(' | ')
      .replaceAll('\u00a0', ' ');
  });
}

describe('templates', () => {
  it('print numbers plain, raised, lowered, with the unit, negative ones in brackets after an operator', () => {
    const numbers = { x: computed(-1.5), k: exact(3), d: exactDose('60') };
    const text = (template: string) => segmentsText(templateSegments(template, numbers, context));
    expect(text('{x} − {x}')).toBe('−1.500 − (−1.500)');
    expect(text('a_{k} = e^{k}, β_[P], Φ^[−1]')).toBe('a_3 = e^3, β_P, Φ^−1');
    expect(text('{d} {unit}')).toBe('60 mg');
    expect(() => text('{absent}')).toThrow(/no number named absent/);
  });

  it('print computed numbers to a length that can be read', () => {
    expect([0, 1 / 3, 0.0012345, 1234.56, 1e-9].map(computedDigits)).toEqual([
      '0',
      '0.333',
      '0.00123',
      '1234.6',
      '1e-9',
    ]);
    expect([58.6412, 0.05, 12345.6].map(computedDoseDigits)).toEqual(['58.6', '0.0500', '12346']);
  });

  it('print doses as powers of ten where the design says so', () => {
    const text = (dose: string) => segmentsText(doseSegments(dose, 'powers-of-ten'));
    expect(['1000', '25000', '5', '0.001'].map(text)).toEqual(['10^3', '2.5 × 10^4', '5', '10^−3']);
  });
});

describe('printed lines', () => {
  const log: Partial<DesignInput> = {
    scale: 'log',
    doses: { kind: 'levels', levels: ['10', '20', '40', '60', '90', '120'] },
    startingDose: '40',
    rule: { name: 'robbins-monro', c: 4.5, k0: 0, gamma: 1, carry: 'iterate' },
    guardrails: {
      ...NO_GUARDRAILS,
      largestRise: { kind: 'fold', factor: 2 },
      noSkipping: 'tried',
      coherence: 'one-way',
      closing: { priorA: 1, priorB: 1, cutoff: 0.95, minimumEvaluable: 3, scope: 'every-level' },
    },
  };

  it('tell the whole way from data to dose', () => {
    expect(printed(levelsDesign({ ...log, maximumCohorts: 10 }), history(['40', [0, 0, 1]]))).toEqual([
      'Observed proportion | ȳ_1 = 1 / 3 | 0.333',
      'Against the target | e_1 = 0.333 − 0.25 | +0.083',
      'Step size | a_1 = 4.5 / 1 | 4.500',
      '1 | Next value, ln mg | x_2 = 3.689 − 4.500 × 0.083 | 3.314',
      'as a dose | e^3.314 | 27.5 mg',
      '2 | Largest rise | at most 2 × 40.0 = 80.0 mg | not reached',
      '3 | Range | 10 to 120 mg | inside',
      '4 | Nearest dose | midpoints 14.1 and 28.3 mg | 20 mg',
      '5 | No skipping | highest tried 40: up to 60 | not reached',
      '6 | Coherence | 0.333 ≥ 0.25: not above 40 | kept',
      'Evaluable subjects | 3 evaluable, 3 needed for a rise | enough',
      // 1 of 3, Γ = 0.25: 0.73828 (FACTS A6, 22)
      '7 | Closed doses | P(p_40 > 0.25) = 0.7383, cutoff 0.95 | none',
      '8 | Stopping | cohort 1 of 10, 3 subjects | go on',
    ]);
  });

  it('say what a guardrail changed, from what to what, and why', () => {
    const lines = printed(levelsDesign(log), history(['40', [0, 0, 0]]));
    expect(lines.find((line) => line.includes('Largest rise'))).toContain(
      'Changed from 4.814 to 4.382. The rule asked for more than the largest rise allows.',
    );
    expect(lines.join('\n')).toContain('Changed from 90 mg to 60 mg. Rounding went above the largest rise');
    const free = { ...log, guardrails: { ...NO_GUARDRAILS, noSkipping: 'tried' as const } };
    expect(printed(levelsDesign(free), history(['40', [0, 0, 0]])).join('\n')).toContain(
      'Changed from 120 mg to 60 mg. A level nobody has been given may not be skipped.',
    );
  });

  it.each<[string, DesignInput['rule'], RegExp]>([
    ['kesten', { name: 'kesten', c: 4, k0: 1, gamma: 0.8, carry: 'iterate' }, /a_2 = 4 \/ \(2 \+ 1\)\^0\.8/],
    ['joseph', { name: 'joseph', slope: 0.25, priorSd: 4 }, /Expected proportion \| b_2 = Φ\(Φ\^−1\(0\.9\)/],
    [
      'virtual observations',
      { name: 'virtual-observations', slope: 0.1 },
      /20\.000 − \(0\.500 − 0\.9\) \/ 0\.1/,
    ],
    [
      'virtual observations within bounds',
      { name: 'virtual-observations', slope: 0.1, carryBounds: { lowest: 19, highest: 21 } },
      /between 19 and 21 \| 21\.000/,
    ],
    [
      'adaptive slope',
      {
        name: 'adaptive-slope',
        form: 'last',
        initialSlope: 0.1,
        slopeLow: 0.01,
        slopeHigh: 1,
        weighted: false,
        carry: 'iterate',
      },
      /initial slope is used/,
    ],
    ['logit', { name: 'logit-ml', firth: true, c: 4, largestMove: 3 }, /No fit can be used yet/],
  ])('print every rule: %s', (_name, rule, expected) => {
    const lines = printed(rangeDesign({ rule }), history(['20', [1, 0]], ['20', [1, 0]]));
    expect(lines.join('\n')).toMatch(expected);
    expect(lines.filter((line) => line.startsWith('1 | Next value, mL'))).toHaveLength(1);
  });

  it('tell of a cohort without an evaluable subject and of a lowered release', () => {
    const empty = printed(levelsDesign(), history(['2', [0, 0, 0]], ['3', []]));
    expect(empty.join('\n')).toContain('No step | cohort 2 has no evaluable subject | 3 mg');
    const lowered = printed(levelsDesign({ startingDose: '4' }), {
      cohorts: [cohort(1, '2', [0, 0, 0], { lowered: true })],
    });
    expect(lowered.join('\n')).toContain('Starts from, mg | f_1 = the lower of 4.000 and 2.000 | 2.000');
  });
});
