import { readNumber } from '@/components/forms/number-text';
import {
  curveThroughPoints,
  curveThroughTarget,
  doseAtProbability,
  type BelievedCurve,
  type BelievedPoint,
} from '@/lib/design/advice';
import { impliedSlope } from '@/lib/design/comparable-rule';
import { doseSetOf } from '@/lib/design/dose-set';
import { fromWorking, signOf } from '@/lib/design/scale';
import type { Design } from '@/lib/schemas/design';

/** A belief as typed: two doses with the probability of a response thought likely at each, and the shape of the curve. */
export interface TypedBelief {
  readonly dose1: string;
  readonly probability1: string;
  readonly dose2: string;
  readonly probability2: string;
  readonly link: BelievedCurve['link'];
}

export type BeliefField = Exclude<keyof TypedBelief, 'link'>;

/** The curve of a typed belief, or the sentence at the field that has to change. */
export type ReadBelief =
  | { readonly ok: true; readonly curve: BelievedCurve }
  | { readonly ok: false; readonly field: BeliefField; readonly message: string };

const short = (value: number): string => String(Number(value.toPrecision(3)));

/**
 * The belief a design's own settings take for granted: the target at the middle of the doses on the working scale, with the
 * slope the rule's gain is best for.
 */
export function impliedBelief(design: Design): TypedBelief {
  const { target, scale } = design;
  const doses = doseSetOf(design.doses, scale);
  const middle = fromWorking(scale, (doses.working(0) + doses.working(doses.count - 1)) / 2);
  const curve = curveThroughTarget(
    'logit',
    target,
    middle,
    impliedSlope(design.rule, target),
    scale,
    signOf(design),
  );
  const other = target < 0.4 ? 0.5 : target > 0.6 ? 0.5 : target / 2;
  const otherDose = curve.ok ? doseAtProbability(curve.value, other) : NaN;
  const points = [
    { dose: middle, probability: target },
    { dose: otherDose, probability: other },
  ].sort((a, b) => a.dose - b.dose) as [BelievedPoint, BelievedPoint];
  const text = (value: number) => (Number.isFinite(value) ? short(value) : '');
  return {
    dose1: text(points[0].dose),
    probability1: short(points[0].probability),
    dose2: text(points[1].dose),
    probability2: short(points[1].probability),
    link: 'logit',
  };
}

/** Reads a typed belief as a curve on the scale and in the direction of a design. */
export function readBelief(design: Design, belief: TypedBelief): ReadBelief {
  const numbers: Partial<Record<BeliefField, number>> = {};
  for (const field of ['dose1', 'probability1', 'dose2', 'probability2'] as const) {
    if (belief[field].trim() === '') return { ok: false, field, message: 'This is empty. Enter a number.' };
    const reading = readNumber(belief[field]);
    if (!reading.ok) return { ok: false, field, message: reading.sentence };
    numbers[field] = reading.value;
  }
  const { dose1 = NaN, probability1 = NaN, dose2 = NaN, probability2 = NaN } = numbers;
  const curve = curveThroughPoints(
    belief.link,
    [
      { dose: dose1, probability: probability1 },
      { dose: dose2, probability: probability2 },
    ],
    design.scale,
    signOf(design),
  );
  if (curve.ok) return { ok: true, curve: curve.value };
  const [, index, kind] = curve.error.path;
  const field = `${String(kind)}${Number(index) + 1}` as BeliefField;
  return { ok: false, field, message: curve.error.message };
}
