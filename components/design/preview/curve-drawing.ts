import { namedTicks, roundDoses, type DoseTick } from '@/components/course/course-scale';
import { doseAtProbability, responseProbability, type BelievedCurve } from '@/lib/design/advice';
import { doseSetOf } from '@/lib/design/dose-set';
import { fromWorking, toWorking } from '@/lib/design/scale';
import type { Design } from '@/lib/schemas/design';
import { computedDoseText } from './computed-text';

/** The size of the drawing and of the room for its axes. */
export const CURVE_BOX = { width: 420, height: 250, left: 46, right: 12, top: 14, bottom: 46 } as const;

/** A dose on the axis and on the curve. */
export interface CurveMark {
  readonly dose: number;
  readonly text: string;
  readonly x: number;
  readonly y: number;
  readonly probability: number;
  readonly isLevel: boolean;
  readonly isStart: boolean;
  readonly isNamed: boolean;
}

/** A believed curve as shapes, all in the drawing's own units. */
export interface CurveDrawing {
  readonly path: string;
  readonly marks: readonly CurveMark[];
  readonly targetY: number;
  /** Where the curve crosses the target; null outside the doses. */
  readonly targetX: number | null;
  readonly targetDose: number;
}

const POINTS = 80;

/** To a tenth of a unit, so that server and browser draw the same to the digit. */
const tenth = (value: number): number => Math.round(value * 10) / 10;

function axisDoses(design: Design): { dose: number; text: string; isLevel: boolean }[] {
  const notation = design.doseNotation;
  if (design.doses.kind === 'levels') {
    return design.doses.levels.map((level) => ({
      dose: Number(level),
      text: notation === 'plain' ? level : computedDoseText(Number(level), notation),
      isLevel: true,
    }));
  }
  return roundDoses(Number(design.doses.lowest), Number(design.doses.highest), design.scale).map((dose) => ({
    dose,
    text: notation === 'plain' ? String(dose) : computedDoseText(dose, notation),
    isLevel: false,
  }));
}

/** Draws a believed curve over the doses of a design. */
export function drawCurve(design: Design, curve: BelievedCurve): CurveDrawing {
  const { width, height, left, right, top, bottom } = CURVE_BOX;
  const doses = doseSetOf(design.doses, design.scale);
  const low = doses.working(0);
  const span = doses.working(doses.count - 1) - low;
  const x = (working: number) => tenth(left + 10 + ((working - low) / span) * (width - left - right - 20));
  const y = (probability: number) => tenth(top + (1 - probability) * (height - top - bottom));
  const at = (part: number) => {
    const working = low + span * part;
    return `${x(working)} ${y(responseProbability(curve, fromWorking(design.scale, working)))}`;
  };
  const path = Array.from({ length: POINTS + 1 }, (_, i) => at(i / POINTS)).join(' L ');
  const axis = axisDoses(design);
  const start = Number(design.startingDose);
  const used = axis.some(({ dose }) => dose === start)
    ? axis
    : [...axis, { dose: start, text: design.startingDose, isLevel: false }].sort((a, b) => a.dose - b.dose);
  const ticks: DoseTick[] = used.map(({ dose, text }) => ({ dose, text, used: dose === start }));
  const xs = used.map(({ dose }) => x(toWorking(design.scale, dose)));
  const widest = Math.max(...used.map(({ text }) => text.length));
  const named = namedTicks(ticks, xs, Math.max(26, widest * 7 + 6));
  const targetDose = doseAtProbability(curve, design.target);
  const targetWorking = toWorking(design.scale, targetDose);
  const isInside = targetWorking >= low && targetWorking <= low + span;
  return {
    path: `M ${path}`,
    marks: used.map(({ dose, text, isLevel }, index) => {
      const probability = responseProbability(curve, dose);
      return {
        dose,
        text,
        x: xs[index] ?? 0,
        y: y(probability),
        probability,
        isLevel,
        isStart: dose === start,
        isNamed: named.has(index),
      };
    }),
    targetY: y(design.target),
    targetX: isInside ? x(targetWorking) : null,
    targetDose,
  };
}
