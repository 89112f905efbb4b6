import { doseText } from '@/lib/design/dose-text';
import type { Design, PrecisionRule } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';
import { ESTIMATOR_TITLES } from './estimator-titles';
import type { WordsItem } from './rule-words';
import { workingUnit } from './working-unit';

const plural = (count: number, one: string, more = `${one}s`): string =>
  `${count} ${count === 1 ? one : more}`;

const percent = (share: number): string => `${Number((share * 100).toPrecision(10))} %`;

/** The response, its target, and its window. */
export function responseItems({ response, target, observationWindow }: Design): WordsItem[] {
  const { length, unit } = observationWindow;
  return [
    { term: 'Response', detail: `“${response.present}”; without it “${response.absent}”` },
    {
      term: 'What it is',
      detail: `${response.kind === 'harm' ? 'a harm' : 'wanted'}; its probability ${response.direction === 'rising' ? 'rises' : 'falls'} with dose`,
    },
    { term: 'Target Γ', detail: `the dose at which the probability of a response is ${target}` },
    {
      term: 'Observed for',
      detail: plural(length, unit === 'days' ? 'day' : 'hour'),
    },
  ];
}

/** The doses that may be released, their scale, and the first of them. */
export function doseItems(design: Design): WordsItem[] {
  const { doses, scale, startingDose, unit, doseNotation } = design;
  const range: WordsItem[] =
    doses.kind === 'range'
      ? [
          {
            term: 'Doses',
            detail: `${doseText(design, doses.lowest)} to ${doseText(design, doses.highest)} by ${doseText(design, doses.increment)}`,
          },
        ]
      : [];
  return [
    ...range,
    { term: 'Starting dose', detail: doseText(design, startingDose) },
    {
      term: 'Unit',
      detail: unitText(unit) === unit ? unit : `${unitText(unit)} (UCUM code ${unit})`,
    },
    {
      term: 'Working scale',
      detail:
        scale === 'log'
          ? `logarithmic: x = ln d, in ${workingUnit(design)}`
          : `linear: x = d, in ${workingUnit(design)}`,
    },
    ...(doseNotation === 'powers-of-ten' ? [{ term: 'Doses are printed', detail: 'as powers of ten' }] : []),
  ];
}

/** Cohorts, replacements, and what a rise needs. */
export function cohortItems(design: Design): WordsItem[] {
  const { cohortSize, maximumCohorts, evaluableForRise, replacements } = design;
  return [
    { term: 'Cohort size', detail: plural(cohortSize, 'subject') },
    { term: 'Maximum of cohorts', detail: String(maximumCohorts) },
    {
      term: 'A rise needs',
      detail: `${plural(evaluableForRise, 'evaluable subject')} in the cohort; with fewer the dose is not raised`,
    },
    {
      term: 'Replacements',
      detail: replacements === 0 ? 'none' : `at most ${replacements} in a cohort, before it is complete`,
    },
    { term: 'Pending outcomes', detail: 'waited for: only complete cohorts are used' },
  ];
}

function largestRise(design: Design): string {
  const { largestRise: rise } = design.guardrails;
  if (rise === null) return 'not bounded';
  if (rise.kind === 'fold') return `to at most ${rise.factor} times the current dose`;
  return `by at most ${rise.step} ${workingUnit(design)}`;
}

function closing({ guardrails, response, doses }: Design): string {
  const rule = guardrails.closing;
  if (rule === null) return 'doses are not closed';
  const what =
    doses.kind === 'range'
      ? 'a dose given, and every dose above it, closes'
      : rule.scope === 'lowest-level'
        ? 'all levels close (the lowest is judged alone)'
        : response.direction === 'falling'
          ? 'the trial stops (the highest level is judged)'
          : 'a level, and every level above it, closes';
  return `${what} when the posterior probability of exceeding the target is above ${rule.cutoff}, from ${plural(rule.minimumEvaluable, 'evaluable subject')} on; prior Beta(${rule.priorA}, ${rule.priorB})`;
}

/** The guardrails in the order they act, steps 2 to 7. */
export function guardrailItems(design: Design): WordsItem[] {
  const { guardrails, doses, response } = design;
  const { projection } = guardrails;
  const onLevels = doses.kind === 'levels';
  const skipping = {
    off: onLevels ? 'levels may be skipped' : 'not used on a range',
    tried: 'at most one level above the highest tried',
    current: 'at most one level above the current one',
  }[guardrails.noSkipping];
  const rising = response.direction === 'rising';
  const coherence = {
    off: 'not used',
    'one-way': `no ${rising ? 'rise' : 'fall'} after a cohort at or above the target`,
    both: `no ${rising ? 'rise' : 'fall'} after a cohort at or above the target, no ${rising ? 'fall' : 'rise'} after one below it`,
  }[guardrails.coherence];
  return [
    { term: '2 Largest rise', detail: largestRise(design) },
    {
      term: '3 Range of the value',
      detail: projection
        ? `${projection.lowest} to ${projection.highest} ${workingUnit(design)}`
        : 'from the lowest dose to the highest',
    },
    {
      term: '4 Rounding',
      detail: `to the nearest ${onLevels ? 'level' : 'dose of the range'} on the working scale; ties go to the ${guardrails.ties} dose${guardrails.ties === 'higher' && guardrails.tiesReason ? `: ${guardrails.tiesReason}` : ''}`,
    },
    { term: '5 No skipping', detail: skipping },
    { term: '6 Coherence', detail: coherence },
    { term: '7 Closed doses', detail: closing(design) },
  ];
}

const PRECISION_ESTIMATORS: Readonly<Record<PrecisionRule['estimator'], string>> = {
  'last-iterate': 'last value',
  'logit-delta': 'logit fit, delta',
  'logit-fieller': 'logit fit, Fieller',
  'probit-delta': 'probit fit, delta',
  'probit-fieller': 'probit fit, Fieller',
};

/** When the trial stops, step 8. */
export function stoppingItems(design: Design): WordsItem[] {
  const { stopping, maximumCohorts, guardrails } = design;
  const { maximumSubjects, repeated, precision } = stopping;
  return [
    ...(guardrails.closing ? [{ term: 'No dose left', detail: 'when every dose is closed' }] : []),
    { term: 'Cohorts', detail: `after ${plural(maximumCohorts, 'cohort')}` },
    {
      term: 'Subjects',
      detail:
        maximumSubjects === null
          ? 'no maximum of its own'
          : `when another cohort would exceed ${plural(maximumSubjects, 'evaluable subject')}`,
    },
    {
      term: 'Same dose repeated',
      detail: repeated
        ? `after the same recommendation ${repeated.times} times in a row, with ${plural(repeated.subjects, 'evaluable subject')} given that dose`
        : 'not used',
    },
    {
      term: 'Precision reached',
      detail: precision
        ? `when the ${percent(precision.level)} interval (${PRECISION_ESTIMATORS[precision.estimator]}) is at most ${precision.width} ${workingUnit(design)} wide, from ${plural(precision.minimumSubjects, 'subject')} on`
        : 'not used',
    },
  ];
}

/** The estimator fixed beforehand, and its interval. */
export function finalItems({ finalEstimator: estimator }: Design): WordsItem[] {
  const fits = estimator.name === 'logit' || estimator.name === 'probit';
  return [
    { term: 'Estimator', detail: ESTIMATOR_TITLES[estimator.name] },
    ...(estimator.name === 'polyak-ruppert'
      ? [{ term: 'Leading values left out', detail: String(estimator.burnIn) }]
      : []),
    ...(fits
      ? [
          {
            term: 'Fitted by',
            detail: estimator.firth ? 'maximum likelihood with Firth’s penalty' : 'maximum likelihood',
          },
        ]
      : []),
    {
      term: 'Interval',
      detail: `${percent(estimator.intervalLevel)}${fits ? `, ${estimator.interval === 'fieller' ? 'Fieller' : 'delta method'}` : ''}`,
    },
  ];
}
