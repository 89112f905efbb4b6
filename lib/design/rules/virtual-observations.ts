import type { SettingsOf } from '@/lib/schemas/design';
import { computed, exact, probability, type TraceLine } from '../trace/line';
import { RULE, type TrialState } from '../trial-state';
import { differenceLine, givenLine, observedLine } from './lines';
import { statusOfNext, type Rule, type StepContext } from './rule';

const SOURCE = 'Cheung & Elkind (2010), Biometrika 97:109–121';
const MEAN_DOSE = RULE.OWN;
const MEAN_PROPORTION = RULE.OWN + 1;
const UNBOUNDED = RULE.OWN + 2;

/**
 * Cheung & Elkind 2010: V_k = ȳ_k + b(x_k − x̃_k), x_{k+1} = x_k − (V_k − Γ)/(k b). Carried without bounds this is
 * mean(x̃) − (mean(ȳ) − Γ)/b, which is what is computed; with bounds the recursion itself.
 */
export const virtualObservations: Rule<'virtual-observations'> = {
  name: 'virtual-observations',
  about: {
    title: 'Virtual observations',
    source: SOURCE,
    suits:
      'Suits levels: it takes up lowered doses, deviations, corrections and replacements by itself. Choose the slope by simulation: a large one sticks, a small one roams.',
  },
  carriesProjected: () => false,
  initialise(_settings, x1, trial) {
    trial.rule.fill(0);
    trial.rule[RULE.X] = x1;
  },
  step({ settings, target, sign }, trial) {
    const r = trial.rule;
    const k = trial.steps;
    let doses = 0;
    let proportions = 0;
    for (let i = 0; i < k; i += 1) {
      doses += trial.given[i] as number;
      proportions += trial.proportion[i] as number;
    }
    const meanDose = doses / k;
    const meanProportion = proportions / k;
    r[MEAN_DOSE] = meanDose;
    r[MEAN_PROPORTION] = meanProportion;
    r[RULE.INDEX] = k;
    r[RULE.FROM] = r[RULE.X] as number;
    r[RULE.GAIN] = 1 / (k * settings.slope);
    r[RULE.NEXT] =
      settings.carryBounds === null
        ? meanDose - (meanProportion - target) / settings.slope
        : boundedRecursion(settings, target, sign, trial);
    return statusOfNext(trial);
  },
  explain(context, trial) {
    return [
      observedLine(trial),
      givenLine(context.sign, trial),
      differenceLine(context.target, trial),
      ...valueLines(context, trial),
    ];
  },
  numbers: (trial) => ({
    index: trial.rule[RULE.INDEX] as number,
    meanDose: trial.rule[MEAN_DOSE] as number,
    meanProportion: trial.rule[MEAN_PROPORTION] as number,
  }),
};

function boundedRecursion(
  { slope, carryBounds }: SettingsOf<'virtual-observations'>,
  target: number,
  sign: 1 | -1,
  trial: TrialState,
): number {
  const bounds = carryBounds as { lowest: number; highest: number };
  const lowest = sign > 0 ? bounds.lowest : -bounds.highest;
  const highest = sign > 0 ? bounds.highest : -bounds.lowest;
  let x = 0;
  for (let i = 0; i < trial.steps; i += 1) {
    // the first value cancels: x_2 does not depend on x_1
    const dose = trial.given[i] as number;
    const from = i === 0 ? dose : x;
    const virtual = (trial.proportion[i] as number) + slope * (from - dose);
    const raw = from - (virtual - target) / ((i + 1) * slope);
    trial.rule[UNBOUNDED] = raw;
    x = raw < lowest ? lowest : raw > highest ? highest : raw;
  }
  return x;
}

function valueLines(
  { settings, target, sign }: StepContext<SettingsOf<'virtual-observations'>>,
  trial: TrialState,
): TraceLine[] {
  const r = trial.rule;
  const k = trial.steps;
  const result = computed(sign * (r[RULE.NEXT] as number), 'x');
  const numbers = {
    dose: computed(sign * (r[MEAN_DOSE] as number), 'x̃'),
    proportion: probability(r[MEAN_PROPORTION] as number, 'ȳ'),
    target: exact(target, 'Γ'),
    slope: exact(settings.slope, 'b'),
  };
  const shared = { step: 1, source: SOURCE, acted: false } as const;
  const means: TraceLine = {
    ...shared,
    id: 'means',
    formula: 'mean x̃ = {dose}, mean ȳ',
    numbers: { dose: numbers.dose },
    result: numbers.proportion,
  };
  if (settings.carryBounds === null) {
    const operator = sign > 0 ? '−' : '+';
    return [
      means,
      {
        ...shared,
        id: 'next',
        symbol: { name: 'x', index: k + 1 },
        formula: `{dose} ${operator} ({proportion} − {target}) / {slope}`,
        numbers,
        result,
      },
    ];
  }
  const unbounded = sign * (r[UNBOUNDED] as number);
  const acted = unbounded !== result.value;
  return [
    means,
    {
      ...shared,
      id: 'unbounded',
      symbol: { name: 'x', index: k + 1 },
      formula: 'x_[k] − (V_[k] − {target}) / (k × {slope}), k = {k}',
      numbers: { target: numbers.target, slope: numbers.slope, k: exact(k, 'k') },
      result: computed(unbounded, 'x'),
    },
    {
      ...shared,
      id: 'next',
      symbol: { name: 'x', index: k + 1 },
      formula: 'between {lowest} and {highest}',
      numbers: {
        lowest: exact(settings.carryBounds.lowest),
        highest: exact(settings.carryBounds.highest),
      },
      result,
      acted,
      before: computed(unbounded),
      after: result,
      ...(acted ? { reason: { code: 'carry-bounded', numbers: {} } as const } : {}),
    },
  ];
}
