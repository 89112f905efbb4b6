import type { LineId, ReasonCode, ResultWord } from './line';

/** Labels of the lines. `next` and its like are followed by the unit of the working scale. */
export const LINE_LABELS: Readonly<Record<LineId, string>> = {
  observed: 'Observed proportion',
  given: 'Mean of the doses given',
  difference: 'Against the target',
  'difference-expected': 'Against the expected proportion',
  start: 'Starts from',
  gain: 'Step size',
  'probit-gain': 'Step size',
  expected: 'Expected proportion',
  'prior-variance': 'Variance of the distance from the target dose',
  'kesten-index': 'Index of the step size',
  unbounded: 'Next value before its bounds',
  means: 'Means over all cohorts',
  slope: 'Fitted slope',
  fit: 'Fitted target dose',
  next: 'Next value',
  'as-dose': 'as a dose',
  stands: 'No step',
  'largest-rise': 'Largest rise',
  projection: 'Range',
  nearest: 'Nearest dose',
  'no-skipping': 'No skipping',
  coherence: 'Coherence',
  evaluable: 'Evaluable subjects',
  closed: 'Closed doses',
  stopping: 'Stopping',
  repeated: 'Same dose repeated',
  precision: 'Precision reached',
  'starting-dose': 'Starting dose',
};

/** Lines whose value is on the working scale and whose label names its unit. */
export const WORKING_LINES: readonly LineId[] = ['given', 'start', 'unbounded', 'fit', 'next'];

/** Lines that carry the number of their step. */
export const NUMBERED_LINES: readonly LineId[] = [
  'next',
  'largest-rise',
  'projection',
  'nearest',
  'no-skipping',
  'coherence',
  'closed',
  'stopping',
];

export const RESULT_WORDS: Readonly<Record<ResultWord, string>> = {
  'not-reached': 'not reached',
  inside: 'inside',
  kept: 'kept',
  none: 'none',
  'go-on': 'go on',
  stop: 'stop',
  off: 'not used',
  enough: 'enough',
  'not-judged': 'too few to judge',
};

/** Why a step changed what it was handed. */
export const REASON_SENTENCES: Readonly<Record<ReasonCode, string>> = {
  'lowered-release': 'A lower dose than recommended was released, so the rule goes on from the lower value.',
  'largest-rise-bounds-value': 'The rule asked for more than the largest rise allows.',
  'largest-rise-bounds-dose': 'Rounding went above the largest rise, so the highest dose within it is taken.',
  'projected-up': 'The rule asked for less than the lowest value.',
  'projected-down': 'The rule asked for more than the highest value.',
  rounded: 'Only doses of the design are released.',
  'tie-lower': 'The value lies halfway between two doses; ties go to the lower.',
  'tie-higher': 'The value lies halfway between two doses; in this design ties go to the higher.',
  'beyond-ends': 'The value lies beyond the last dose.',
  'skips-level': 'A level nobody has been given may not be skipped.',
  'response-at-or-above-target': 'The observed proportion is at or above the target.',
  'response-below-target': 'The observed proportion is below the target.',
  'too-few-evaluable': 'Fewer subjects were evaluable than a rise needs.',
  closed:
    'The posterior probability of exceeding the target is above the cutoff; this dose and all above are closed.',
  'all-closed': 'The criterion for closing leaves no dose.',
  'slope-truncated': 'The fitted slope lies outside its bounds.',
  'slope-not-defined': 'The doses given do not differ, so the initial slope is used.',
  'firth-fit': 'The likelihood has no finite maximum or no usable slope, so Firth’s penalty is used.',
  'no-fit': 'No fit can be used yet, so the value moves by the fallback step.',
  'move-limited': 'The fitted value lies further away than the largest move.',
  'carry-bounded': 'The carried value is kept within its bounds.',
  'no-evaluable-subject':
    'A cohort without an evaluable subject is no step: the recommendation before it stands.',
  'closed-all': 'Every dose is closed.',
  'maximum-cohorts': 'The maximum of cohorts is reached.',
  'maximum-subjects': 'Another cohort would exceed the maximum of subjects.',
  repeated: 'The same dose was recommended often enough, and enough subjects were given it.',
  precision: 'The target dose is estimated as precisely as was asked for.',
};
