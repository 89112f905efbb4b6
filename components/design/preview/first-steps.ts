import { stepAdvice, type RunAhead } from '@/lib/design/advice';
import { equalDecimals } from '@/lib/design/decimal';
import { doseSetOf, nearestIndex } from '@/lib/design/dose-set';
import { doseText } from '@/lib/design/dose-text';
import { stepSizes } from '@/lib/design/step-sizes';
import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { computedDoseText, computedText } from './computed-text';

/** How many steps are shown. */
export const FIRST_STEPS = 10;

/** One step as it is read. */
export interface FirstStep {
  readonly k: number;
  readonly gain: string;
  /** The rule's value after a cohort without and with nothing but responses, in dose units. */
  readonly afterNone: string;
  readonly afterAll: string;
  /** What it takes to change the dose: "1 cohort: 20 mg", "stays"; null on a range, where every step moves. */
  readonly moveNone: string | null;
  readonly moveAll: string | null;
}

function moveText(design: Design, around: Dose, ahead: RunAhead, isDown: boolean): string {
  const doses = doseSetOf(design.doses, design.scale);
  const end = isDown ? doses.dose(0) : doses.dose(doses.count - 1);
  if (equalDecimals(around, end)) return isDown ? 'lowest' : 'highest';
  if (ahead.cohorts === null) return 'frozen';
  const to = ahead.to === null ? 'all closed' : doseText(design, ahead.to);
  return `${ahead.cohorts} in a row: ${to}`;
}

/**
 * The first ten steps of a design seen from one of its doses: the gain, where the value would go after a cohort without and
 * with nothing but responses, and on levels how many such cohorts in a row change the dose.
 * @param around a dose of the design
 */
export function firstSteps(design: Design, around: Dose): FirstStep[] {
  const sizes = stepSizes(design, around, FIRST_STEPS);
  const moves = design.doses.kind === 'levels' ? stepAdvice(design, around) : [];
  const responsesLower = design.response.direction === 'rising';
  return sizes.map((size, index) => {
    const move = moves[index];
    return {
      k: size.k,
      gain: computedText(size.gain),
      afterNone: computedDoseText(size.doseAfterNone, design.doseNotation),
      afterAll: computedDoseText(size.doseAfterAll, design.doseNotation),
      moveNone: move ? moveText(design, around, move.noResponses, !responsesLower) : null,
      moveAll: move ? moveText(design, around, move.allResponses, responsesLower) : null,
    };
  });
}

/** The doses a reader may look at the steps from: the levels, or the start and at most seven doses over the range. */
export function dosesToStepFrom(design: Design): Dose[] {
  if (design.doses.kind === 'levels') return [...design.doses.levels];
  const doses = doseSetOf(design.doses, design.scale);
  const last = doses.count - 1;
  const shown = new Set([0, last, doses.indexOf(design.startingDose)]);
  for (let part = 1; part < 6; part += 1) {
    const x = doses.working(0) + ((doses.working(last) - doses.working(0)) * part) / 6;
    shown.add(nearestIndex(doses, x, false));
  }
  return [...shown]
    .filter((index) => index >= 0)
    .sort((a, b) => a - b)
    .map((index) => doses.dose(index));
}
