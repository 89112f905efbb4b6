import { stepAdvice, type RunAhead } from '@/lib/design/advice';
import { equalDecimals } from '@/lib/design/decimal';
import { doseSetOf, nearestIndex } from '@/lib/design/dose-set';
import { doseText } from '@/lib/design/dose-text';
import { stepSizes } from '@/lib/design/step-sizes';
import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { unitText } from '@/lib/schemas/units';
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
  /** How many such cohorts in a row change the dose and to which: "2, to 20", or "frozen"; null where it is not asked. */
  readonly moveNone: string | null;
  readonly moveAll: string | null;
}

function moveText(design: Design, { cohorts, to, stops }: RunAhead): string {
  if (cohorts === null) return stops ? 'stops first' : 'frozen';
  if (to === null) return `${cohorts}, all closed`;
  return `${cohorts}, to ${doseNumber(design, to)}`.replaceAll(' ', '\u00a0');
}

function doseNumber(design: Design, dose: Dose): string {
  return doseText(design, dose).replace(` ${unitText(design.unit)}`, '');
}

/** Which ends of the doses a dose is: there is nothing beyond them to move to. */
function endsAt(design: Design, dose: Dose): { lowest: boolean; highest: boolean } {
  const doses = doseSetOf(design.doses, design.scale);
  return {
    lowest: equalDecimals(dose, doses.dose(0)),
    highest: equalDecimals(dose, doses.dose(doses.count - 1)),
  };
}

/**
 * The first ten steps of a design seen from one of its doses: the gain, where the value would go after a cohort without and
 * with nothing but responses, and on levels how many such cohorts in a row change the dose, in the directions where there is
 * a level to change to.
 * @param around a dose of the design
 */
export function firstSteps(design: Design, around: Dose): FirstStep[] {
  const sizes = stepSizes(design, around, FIRST_STEPS);
  const moves = design.doses.kind === 'levels' ? stepAdvice(design, around) : [];
  const { lowest, highest } = endsAt(design, around);
  const responsesLower = design.response.direction === 'rising';
  const isEnd = { none: responsesLower ? highest : lowest, all: responsesLower ? lowest : highest };
  return sizes.map((size, index) => {
    const move = moves[index];
    return {
      k: size.k,
      gain: computedText(size.gain),
      afterNone: computedDoseText(size.doseAfterNone, design.doseNotation),
      afterAll: computedDoseText(size.doseAfterAll, design.doseNotation),
      moveNone: move && !isEnd.none ? moveText(design, move.noResponses) : null,
      moveAll: move && !isEnd.all ? moveText(design, move.allResponses) : null,
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
