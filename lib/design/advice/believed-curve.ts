import { normalDensity, normalQuantile } from '../distributions/normal';
import { linkFunction, linkInverse, type Link } from '../estimate/binary-regression';
import { failure, success, type Result } from '../result';
import { fromWorking, toWorking, type Scale } from '../scale';

/** A response curve someone believes in: link(M(x)) = intercept + slope·x, x on the working scale. */
export interface BelievedCurve {
  readonly link: Link;
  readonly scale: Scale;
  readonly intercept: number;
  /** Slope of the link: β_L or β_P with its sign, never the slope D of the curve. */
  readonly slope: number;
}

/** Why a belief is no curve, at which field, with what to do. */
export interface BeliefFailure {
  readonly path: readonly (string | number)[];
  readonly message: string;
}

/** A dose, in the trial's unit, with the response probability believed there. */
export interface BelievedPoint {
  readonly dose: number;
  readonly probability: number;
}

/** The three slopes at the target dose. Each means something else; none stands in for another. */
export interface TargetSlopes {
  /** D = |M'(θ)|: probability per working-scale unit. What a gain is the inverse of; the slope of virtual observations. */
  readonly curve: number;
  /** |β_L| of the logit with this D at the target: D/(Γ(1 − Γ)). */
  readonly logit: number;
  /** |β_P| of the probit with this D at the target: D/φ(Φ⁻¹(Γ)). What Joseph's rule asks for. */
  readonly probit: number;
}

function refuse(path: (string | number)[], message: string): Result<never, BeliefFailure> {
  return failure({ path, message });
}

/** The three slopes at the target dose, from D. */
export function slopesFromCurve(curve: number, target: number): TargetSlopes {
  return {
    curve,
    logit: curve / (target * (1 - target)),
    probit: curve / normalDensity(normalQuantile(target)),
  };
}

/** D at the target dose from the slope of one kind, β_L or β_P or D itself. */
export function curveSlopeFrom(kind: 'curve' | Link, slope: number, target: number): number {
  if (kind === 'curve') return Math.abs(slope);
  const perUnit = kind === 'logit' ? target * (1 - target) : normalDensity(normalQuantile(target));
  return Math.abs(slope) * perUnit;
}

/**
 * The curve through two believed points.
 *
 * @param link logit or probit. @param points two different doses (in the trial's unit, > 0 on the log scale) with different
 * probabilities in (0, 1). @param scale the working scale. @param direction 1 when response rises with dose, −1 when it falls.
 * @returns the curve, or the field that is wrong and why.
 */
export function curveThroughPoints(
  link: Link,
  points: readonly [BelievedPoint, BelievedPoint],
  scale: Scale,
  direction: 1 | -1,
): Result<BelievedCurve, BeliefFailure> {
  for (const [i, { dose, probability }] of points.entries()) {
    if (!Number.isFinite(dose) || dose < 0 || (scale === 'log' && dose === 0)) {
      return refuse(
        ['points', i, 'dose'],
        scale === 'log'
          ? 'The dose is not above 0, so it has no logarithm. Enter a dose above 0.'
          : 'The dose is not a number from 0 up. Enter one.',
      );
    }
    if (!(probability > 0 && probability < 1)) {
      return refuse(
        ['points', i, 'probability'],
        'The believed probability is not strictly between 0 and 1. Enter one such as 0.1.',
      );
    }
  }
  const [a, b] = points;
  const run = toWorking(scale, b.dose) - toWorking(scale, a.dose);
  const rise = linkFunction(link, b.probability) - linkFunction(link, a.probability);
  if (run === 0) return refuse(['points', 1, 'dose'], 'Both doses are the same. Enter two different doses.');
  if (!(direction * rise * run > 0)) {
    return refuse(
      ['points', 1, 'probability'],
      direction > 0
        ? 'The probability does not rise with dose, as the design says it does. Enter a higher probability at the higher dose.'
        : 'The probability does not fall with dose, as the design says it does. Enter a lower probability at the higher dose.',
    );
  }
  const slope = rise / run;
  return success({
    link,
    scale,
    slope,
    intercept: linkFunction(link, a.probability) - slope * toWorking(scale, a.dose),
  });
}

/**
 * The curve with a given slope D at a given target dose.
 *
 * @param link logit or probit. @param target Γ. @param targetDose believed target dose, trial's unit (> 0 on the log scale).
 * @param curveSlope D > 0, probability per working-scale unit. @param direction 1 rising, −1 falling.
 */
export function curveThroughTarget(
  link: Link,
  target: number,
  targetDose: number,
  curveSlope: number,
  scale: Scale,
  direction: 1 | -1,
): Result<BelievedCurve, BeliefFailure> {
  const x = toWorking(scale, targetDose);
  if (!Number.isFinite(x) || targetDose < 0) {
    return refuse(
      ['targetDose'],
      'The believed target dose is not a dose on the working scale. Enter a dose above 0.',
    );
  }
  if (!(curveSlope > 0) || !Number.isFinite(curveSlope)) {
    return refuse(
      ['slope'],
      'The slope is not above 0. Enter it as a positive number; the design gives its direction.',
    );
  }
  const slopes = slopesFromCurve(curveSlope, target);
  const slope = direction * (link === 'logit' ? slopes.logit : slopes.probit);
  return success({ link, scale, slope, intercept: linkFunction(link, target) - slope * x });
}

/** M at a dose in the trial's unit. */
export function responseProbability(curve: BelievedCurve, dose: number): number {
  return linkInverse(curve.link, curve.intercept + curve.slope * toWorking(curve.scale, dose));
}

/** The dose, in the trial's unit, at which the curve has probability p. */
export function doseAtProbability(curve: BelievedCurve, p: number): number {
  return fromWorking(curve.scale, (linkFunction(curve.link, p) - curve.intercept) / curve.slope);
}

/** D of a curve at the target, and its equivalents. */
export function slopesAtTarget(curve: BelievedCurve, target: number): TargetSlopes {
  return slopesFromCurve(curveSlopeFrom(curve.link, curve.slope, target), target);
}
