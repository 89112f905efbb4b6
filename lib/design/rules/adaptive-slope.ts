import type { SettingsOf } from '@/lib/schemas/design';
import { computed, exact, probability, type TraceLine } from '../trace/line';
import { RULE, type TrialState } from '../trial-state';
import { differenceLine, givenLine, observedLine, startLines } from './lines';
import { enterStart, statusOfNext, type Rule, type StepContext } from './rule';

const SOURCE = 'Lai & Robbins (1979), Ann. Stat. 7:1196–1221; Anbar (1978)';

/** The least-squares slope (NaN where undefined), the slope used, and the means it goes through. */
export const ADAPTIVE = {
  FITTED: RULE.OWN,
  USED: RULE.OWN + 1,
  MEAN_DOSE: RULE.OWN + 2,
  MEAN_PROPORTION: RULE.OWN + 3,
} as const;

/** Share of the largest dose below which the doses given count as equal and no slope is defined. */
const EQUAL_SHARE = 1e-12;

/**
 * Lai & Robbins 1979, Anbar 1978: b̂_k = least-squares slope of ȳ on x̃ over cohorts 1…k, truncated. Form `last`:
 * x_{k+1} = f_k − e_k/(k b̂_k). Form `mean`: x_{k+1} = mean(x̃) − (mean(ȳ) − Γ)/b̂_k.
 */
export const adaptiveSlope: Rule<'adaptive-slope'> = {
  name: 'adaptive-slope',
  about: {
    title: 'Adaptive slope',
    source: SOURCE,
    suits:
      'Suits a continuous range with larger cohorts and no firm belief on the slope; with few subjects the fitted slope is mostly its bounds.',
  },
  carriesProjected: (settings) => settings.form === 'last',
  initialise(_settings, x1, trial) {
    trial.rule.fill(0);
    trial.rule[RULE.X] = x1;
  },
  step({ settings, target, sign }, trial) {
    const r = trial.rule;
    const last = trial.steps - 1;
    const index = (r[RULE.INDEX] as number) + 1;
    fitSlope(settings, trial);
    const slope = r[ADAPTIVE.USED] as number;
    r[RULE.INDEX] = index;
    r[RULE.GAIN] = 1 / (index * slope);
    if (settings.form === 'last') {
      enterStart(settings.carry, sign, trial);
      const error = (trial.proportion[last] as number) - target;
      r[RULE.NEXT] = (r[RULE.FROM] as number) - error / (index * slope);
    } else {
      const error = (r[ADAPTIVE.MEAN_PROPORTION] as number) - target;
      r[RULE.FROM] = r[ADAPTIVE.MEAN_DOSE] as number;
      r[RULE.NEXT] = (r[ADAPTIVE.MEAN_DOSE] as number) - error / slope;
    }
    return statusOfNext(trial);
  },
  explain(context, trial) {
    return [
      observedLine(trial),
      givenLine(context.sign, trial),
      differenceLine(context.target, trial),
      slopeLine(context, trial),
      ...(context.settings.form === 'last' ? startLines(context, context.settings.carry, trial) : []),
      nextLine(context, trial),
    ];
  },
  numbers: (trial) => ({
    index: trial.rule[RULE.INDEX] as number,
    slope: trial.rule[ADAPTIVE.USED] as number,
  }),
};

function fitSlope(settings: SettingsOf<'adaptive-slope'>, trial: TrialState): void {
  const { steps, given, proportion, size } = trial;
  let total = 0;
  let doses = 0;
  let proportions = 0;
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < steps; i += 1) {
    const x = given[i] as number;
    const weight = settings.weighted ? (size[i] as number) : 1;
    total += weight;
    doses += weight * x;
    proportions += weight * (proportion[i] as number);
    if (x < low) low = x;
    if (x > high) high = x;
  }
  const meanDose = doses / total;
  const meanProportion = proportions / total;
  let squares = 0;
  let products = 0;
  for (let i = 0; i < steps; i += 1) {
    const weight = settings.weighted ? (size[i] as number) : 1;
    const deviation = (given[i] as number) - meanDose;
    squares += weight * deviation * deviation;
    products += weight * deviation * ((proportion[i] as number) - meanProportion);
  }
  const equal = high - low <= EQUAL_SHARE * (1 + Math.max(Math.abs(low), Math.abs(high)));
  const fitted = equal ? NaN : products / squares;
  const raw = equal ? settings.initialSlope : fitted;
  trial.rule[ADAPTIVE.FITTED] = fitted;
  trial.rule[ADAPTIVE.USED] =
    raw < settings.slopeLow ? settings.slopeLow : raw > settings.slopeHigh ? settings.slopeHigh : raw;
  trial.rule[ADAPTIVE.MEAN_DOSE] = meanDose;
  trial.rule[ADAPTIVE.MEAN_PROPORTION] = meanProportion;
}

function slopeLine({ settings }: StepContext<SettingsOf<'adaptive-slope'>>, trial: TrialState): TraceLine {
  const fitted = trial.rule[ADAPTIVE.FITTED] as number;
  const used = computed(trial.rule[ADAPTIVE.USED] as number, 'b̂');
  const undefinedSlope = Number.isNaN(fitted);
  const raw = undefinedSlope ? exact(settings.initialSlope, 'b₀') : computed(fitted, 'b̂');
  const truncated = used.value !== raw.value;
  return {
    id: 'slope',
    step: 1,
    symbol: { name: 'b̂', index: trial.steps },
    formula: '{raw}, between {low} and {high}',
    numbers: { raw, low: exact(settings.slopeLow), high: exact(settings.slopeHigh) },
    result: used,
    source: SOURCE,
    acted: truncated,
    before: raw,
    after: used,
    ...(undefinedSlope
      ? { reason: { code: 'slope-not-defined', numbers: {} } as const }
      : truncated
        ? { reason: { code: 'slope-truncated', numbers: {} } as const }
        : {}),
  };
}

function nextLine(
  { settings, target, sign }: StepContext<SettingsOf<'adaptive-slope'>>,
  trial: TrialState,
): TraceLine {
  const r = trial.rule;
  const operator = sign > 0 ? '−' : '+';
  const slope = computed(r[ADAPTIVE.USED] as number, 'b̂');
  const shared = {
    id: 'next',
    step: 1,
    symbol: { name: 'x', index: trial.steps + 1 },
    result: computed(sign * (r[RULE.NEXT] as number), 'x'),
    source: SOURCE,
    acted: false,
  } as const;
  if (settings.form === 'last') {
    return {
      ...shared,
      formula: `{from} ${operator} {difference} / ({index} × {slope})`,
      numbers: {
        from: computed(sign * (r[RULE.FROM] as number), 'f'),
        difference: computed((trial.proportion[trial.steps - 1] as number) - target, 'e'),
        index: exact(r[RULE.INDEX] as number, 'k'),
        slope,
      },
    };
  }
  return {
    ...shared,
    formula: `{dose} ${operator} ({proportion} − {target}) / {slope}`,
    numbers: {
      dose: computed(sign * (r[ADAPTIVE.MEAN_DOSE] as number), 'x̃'),
      proportion: probability(r[ADAPTIVE.MEAN_PROPORTION] as number, 'ȳ'),
      target: exact(target, 'Γ'),
      slope,
    },
  };
}
