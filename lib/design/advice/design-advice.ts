import type { Design } from '@/lib/schemas/design';
import { doseSetOf } from '../dose-set';
import { signOf, toWorking } from '../scale';
import {
  doseAtProbability,
  responseProbability,
  slopesAtTarget,
  slopesFromCurve,
  type BelievedCurve,
  type TargetSlopes,
} from './believed-curve';
import { assessGain, gainAt, longRunGain, type GainAssessment } from './gain';
import { givenFreeze, type GivenFreeze } from './movement';
import { settlingLevels, type SettlingLevel } from './settling';

/** A belief a design is judged against: a curve, and how far its slope at the target may be off. */
export interface Belief {
  readonly curve: BelievedCurve;
  /** Smallest and largest D thought possible, probability per working-scale unit; without it the curve's own. */
  readonly slopeRange?: { readonly lowest: number; readonly highest: number };
}

/** What a statistician should know; sentences in `adviceTexts`. */
export type AdviceNote =
  | 'gain-too-small'
  | 'gain-too-small-for-lowest-slope'
  | 'gain-inefficient'
  | 'assumed-slope-outside-belief'
  | 'extreme-target'
  | 'target-dose-outside-doses'
  | 'start-above-target'
  | 'averaging-needs-smaller-exponent'
  | 'no-settling-level'
  | 'several-settling-levels'
  | 'alternates-between-levels'
  | 'freezes';

export const adviceTexts: Record<AdviceNote, string> = {
  'gain-too-small':
    'Twice the gain times the believed slope is not above 1: the rule converges too slowly. Choose a larger gain.',
  'gain-too-small-for-lowest-slope':
    'If the slope is as small as thought possible, twice the gain times the slope is not above 1. Choose a larger gain, with an offset k0 above 0 to keep early moves small.',
  'gain-inefficient':
    'The gain is less than 75 % efficient for the believed slope. The best gain is the inverse of the slope.',
  'assumed-slope-outside-belief':
    'The believed slope lies outside the bounds the rule truncates its slope to. Widen them.',
  'extreme-target':
    'The target lies outside 0.25 to 0.75, where plain Robbins–Monro needs a good start (Wetherill 1963). Joseph’s gains are suggested.',
  'target-dose-outside-doses': 'The believed target dose lies outside the doses of the design.',
  'start-above-target': 'The starting dose is above the believed target dose of a harm.',
  'averaging-needs-smaller-exponent':
    'Averaging is efficient only for gain exponents below 1, for example 0.7.',
  'no-settling-level': 'On the believed curve the rule settles on no level; it goes to and fro between two.',
  'several-settling-levels':
    'On the believed curve the rule can settle on more than one level; chance decides which, and leaves them early.',
  'alternates-between-levels':
    'On levels this rule settles on no inner level but alternates around the target, ever more slowly.',
  freezes:
    'Carrying on from the dose given, the rule freezes: late cohorts cannot change the level any more.',
};

/** The design judged against a belief. */
export interface DesignAdvice {
  /** θ in the trial's unit. */
  readonly targetDose: number;
  readonly startingProbability: number;
  readonly slopes: {
    readonly lowest: TargetSlopes;
    readonly believed: TargetSlopes;
    readonly highest: TargetSlopes;
  };
  /** c* = 1/D for the believed slope. */
  readonly bestGain: number;
  /** The rule's own long-run gain for each slope. */
  readonly gains: {
    readonly lowest: GainAssessment;
    readonly believed: GainAssessment;
    readonly highest: GainAssessment;
  };
  /** Virtual observations on levels: where they can settle. */
  readonly settling: readonly SettlingLevel[] | null;
  /** Robbins–Monro or Kesten on levels, carrying the dose given. */
  readonly freeze: GivenFreeze | null;
  readonly notes: readonly AdviceNote[];
}

/** Targets outside these need a good start under plain Robbins–Monro (Wetherill 1963). */
export function isExtremeTarget(target: number): boolean {
  return target < 0.25 || target > 0.75;
}

/**
 * Judges a design against a believed curve.
 *
 * @param design a validated design. @param belief the curve on the design's scale and in its direction; a range of D.
 * @throws RangeError when the curve is on another scale or runs the other way.
 */
export function adviseDesign(design: Design, belief: Belief): DesignAdvice {
  const { curve } = belief;
  const sign = signOf(design);
  if (curve.scale !== design.scale || !(sign * curve.slope > 0)) {
    throw new RangeError('The believed curve is not on the scale and in the direction of the design.');
  }
  const { target, rule, maximumCohorts, cohortSize } = design;
  const doses = doseSetOf(design.doses, design.scale);
  const start = Number(design.startingDose);
  const targetDose = doseAtProbability(curve, target);
  const believed = slopesAtTarget(curve, target);
  const lowest = slopesFromCurve(belief.slopeRange?.lowest ?? believed.curve, target);
  const highest = slopesFromCurve(belief.slopeRange?.highest ?? believed.curve, target);
  const startError = Math.abs(toWorking(design.scale, start) - toWorking(design.scale, targetDose));
  const assess = (slopes: TargetSlopes) =>
    assessGain(
      longRunGain(rule, slopes.curve, target),
      slopes.curve,
      target,
      cohortSize,
      maximumCohorts,
      startError,
    );
  const gains = { lowest: assess(lowest), believed: assess(believed), highest: assess(highest) };

  const notes: AdviceNote[] = [];
  if (gains.believed.tooSmall) notes.push('gain-too-small');
  else if (gains.lowest.tooSmall) notes.push('gain-too-small-for-lowest-slope');
  const { efficiency } = gains.believed;
  if (efficiency !== null && efficiency > 0 && efficiency < 0.75) notes.push('gain-inefficient');
  if (rule.name === 'adaptive-slope' && (believed.curve < rule.slopeLow || believed.curve > rule.slopeHigh)) {
    notes.push('assumed-slope-outside-belief');
  }
  const plain = rule.name === 'robbins-monro' || rule.name === 'kesten';
  if (plain && isExtremeTarget(target)) notes.push('extreme-target');
  if (targetDose < doses.value(0) || targetDose > doses.value(doses.count - 1))
    notes.push('target-dose-outside-doses');
  if (design.response.kind === 'harm' && sign > 0 && start > targetDose) notes.push('start-above-target');
  if (plain && rule.gamma === 1 && design.finalEstimator.name === 'polyak-ruppert') {
    notes.push('averaging-needs-smaller-exponent');
  }
  const settling = levelsAdvice(design, belief, notes);
  const freeze = freezeAdvice(design, notes);
  return {
    targetDose,
    startingProbability: responseProbability(curve, start),
    slopes: { lowest, believed, highest },
    bestGain: 1 / believed.curve,
    gains,
    settling,
    freeze,
    notes,
  };
}

function levelsAdvice(design: Design, { curve }: Belief, notes: AdviceNote[]): SettlingLevel[] | null {
  const { rule, doses } = design;
  if (doses.kind !== 'levels') return null;
  const set = doseSetOf(doses, design.scale);
  if (rule.name === 'virtual-observations') {
    const probability = (index: number) => responseProbability(curve, set.value(index));
    const levels = settlingLevels(set, probability, design.target, rule.slope, signOf(design));
    if (levels.length === 0) notes.push('no-settling-level');
    if (levels.length > 1) notes.push('several-settling-levels');
    return levels;
  }
  const carriesIterate = 'carry' in rule ? rule.carry === 'iterate' : rule.name === 'joseph';
  if (carriesIterate && rule.name !== 'adaptive-slope') notes.push('alternates-between-levels');
  return null;
}

function freezeAdvice(design: Design, notes: AdviceNote[]): GivenFreeze | null {
  const { rule, doses } = design;
  if (doses.kind !== 'levels') return null;
  if (rule.name !== 'robbins-monro' && rule.name !== 'kesten') return null;
  if (rule.carry !== 'given') return null;
  const set = doseSetOf(doses, design.scale);
  let gap = Infinity;
  for (let i = 1; i < set.count; i++) gap = Math.min(gap, set.working(i) - set.working(i - 1));
  const freeze = givenFreeze(
    (k) => gainAt(rule, k),
    design.target,
    gap,
    design.maximumCohorts,
    signOf(design),
  );
  if (freeze.noRiseFrom !== null || freeze.noFallFrom !== null) notes.push('freezes');
  return freeze;
}
