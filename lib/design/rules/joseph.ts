import { normalCdf, normalDensity, normalQuantile } from '../distributions/normal';
import { owensT } from '../distributions/owens-t';
import { computed, exact, probability, signed, type TraceLine } from '../trace/line';
import { RULE, type TrialState } from '../trial-state';
import { observedLine, startLines } from './lines';
import { enterStart, statusOfNext, type Rule, type StepContext } from './rule';

const SOURCE = 'Joseph (2004), Biometrika 91:461–470';
const COHORT_SOURCE = `${SOURCE}; extended to cohorts by the best linear update under the same model`;

/** τ²_k on entry, τ²_{k+1} after; b_k, C_k, V_k and τ²_k of the step just made. */
export const JOSEPH = {
  TAU2: RULE.OWN,
  EXPECTED: RULE.OWN + 1,
  COVARIANCE: RULE.OWN + 2,
  VARIANCE: RULE.OWN + 3,
  TAU2_BEFORE: RULE.OWN + 4,
} as const;

/**
 * Joseph 2004 with its extension to cohorts: with Z = x_k − θ ~ N(0, τ_k²) and P(response) = Φ(q + β_P Z),
 * a_k = Cov(Z, ȳ)/Var(ȳ), b_k = E ȳ, x_{k+1} = f_k − a_k(ȳ_k − b_k), τ²_{k+1} = τ_k² − C_k²/V_k.
 */
export const joseph: Rule<'joseph'> = {
  name: 'joseph',
  about: {
    title: 'Joseph’s efficient gains',
    source: SOURCE,
    suits:
      'Suits targets outside 0.25 to 0.75, such as 0.9, where plain Robbins–Monro is poor. On levels it is an approximation: it takes the dose given for the assigned value.',
  },
  carriesProjected: () => true,
  initialise(settings, x1, trial) {
    trial.rule.fill(0);
    trial.rule[RULE.X] = x1;
    trial.rule[JOSEPH.TAU2] = settings.priorSd * settings.priorSd;
  },
  step(context, trial) {
    const r = trial.rule;
    const tau2 = r[JOSEPH.TAU2] as number;
    enterMoments(context, trial);
    const covariance = r[JOSEPH.COVARIANCE] as number;
    const gain = covariance / (r[JOSEPH.VARIANCE] as number);
    const error = (trial.proportion[trial.steps - 1] as number) - (r[JOSEPH.EXPECTED] as number);
    enterStart('iterate', context.sign, trial);
    r[JOSEPH.TAU2_BEFORE] = tau2;
    r[JOSEPH.TAU2] = tau2 - covariance * gain;
    r[RULE.INDEX] = (r[RULE.INDEX] as number) + 1;
    r[RULE.GAIN] = gain;
    r[RULE.NEXT] = (r[RULE.FROM] as number) - gain * error;
    return statusOfNext(trial);
  },
  explain(context, trial) {
    return [observedLine(trial), ...startLines(context, 'iterate', trial), ...gainLines(context, trial)];
  },
  numbers: (trial) => ({
    index: trial.rule[RULE.INDEX] as number,
    gain: trial.rule[RULE.GAIN] as number,
    expected: trial.rule[JOSEPH.EXPECTED] as number,
    priorVariance: trial.rule[JOSEPH.TAU2] as number,
  }),
};

/** Numbers remembered of a step: what the moments depend on (τ², m, β_P, Γ), then b, C and V. */
const REMEMBERED = 7;

/**
 * Puts b_k, C_k and V_k into the registers. They depend on no outcome, only on τ² and m, so that a simulator meets the same
 * ones trial after trial: each step's last are remembered in the trial's state and used again where all they depend on agrees.
 */
function enterMoments(context: StepContext<{ slope: number }>, trial: TrialState): void {
  const { target } = context;
  const beta = context.settings.slope;
  const r = trial.rule;
  const m = trial.size[trial.steps - 1] as number;
  const tau2 = r[JOSEPH.TAU2] as number;
  const memory = trial.remembered(REMEMBERED);
  const at = (trial.steps - 1) * REMEMBERED;
  const known =
    memory[at] === tau2 && memory[at + 1] === m && memory[at + 2] === beta && memory[at + 3] === target;
  if (!known) {
    const ratio = beta * beta * tau2;
    const spread = Math.sqrt(1 + ratio);
    const h = normalQuantile(target) / spread;
    const b = normalCdf(h);
    let variance = b * (1 - b);
    if (m > 1) {
      const square = b - 2 * owensT(h, 1 / Math.sqrt(1 + 2 * ratio));
      variance = (variance + (m - 1) * (square - b * b)) / m;
    }
    memory[at] = tau2;
    memory[at + 1] = m;
    memory[at + 2] = beta;
    memory[at + 3] = target;
    memory[at + 4] = b;
    memory[at + 5] = (beta * tau2 * normalDensity(h)) / spread;
    memory[at + 6] = variance;
  }
  r[JOSEPH.EXPECTED] = memory[at + 4] as number;
  r[JOSEPH.COVARIANCE] = memory[at + 5] as number;
  r[JOSEPH.VARIANCE] = memory[at + 6] as number;
}

function gainLines(
  { settings, target, sign }: StepContext<{ slope: number }>,
  trial: TrialState,
): TraceLine[] {
  const r = trial.rule;
  const k = trial.steps;
  const m = trial.size[k - 1] as number;
  const source = m > 1 ? COHORT_SOURCE : SOURCE;
  const b = r[JOSEPH.EXPECTED] as number;
  const proportion = trial.proportion[k - 1] as number;
  const shared = { step: 1, source, acted: false } as const;
  return [
    {
      ...shared,
      id: 'prior-variance',
      formula: 'τ²_{k}; after this step τ²_{next} = {after}',
      numbers: {
        k: exact(k),
        next: exact(k + 1),
        after: computed(r[JOSEPH.TAU2] as number, 'τ²'),
      },
      result: computed(r[JOSEPH.TAU2_BEFORE] as number, 'τ²'),
    },
    {
      ...shared,
      id: 'expected',
      symbol: { name: 'b', index: k },
      formula: 'Φ(Φ^[−1]({target}) / √(1 + {slope}² × {variance}))',
      numbers: {
        target: exact(target, 'Γ'),
        slope: exact(settings.slope, 'β_P'),
        variance: computed(r[JOSEPH.TAU2_BEFORE] as number, 'τ²'),
      },
      result: probability(b, 'b'),
    },
    {
      ...shared,
      id: 'difference-expected',
      formula: '{proportion} − {expected}',
      numbers: { proportion: probability(proportion, 'ȳ'), expected: probability(b, 'b') },
      result: signed(proportion - b),
    },
    {
      ...shared,
      id: 'probit-gain',
      symbol: { name: 'a', index: k },
      formula: '{covariance} / {variance}',
      numbers: {
        covariance: computed(r[JOSEPH.COVARIANCE] as number, 'C'),
        variance: computed(r[JOSEPH.VARIANCE] as number, 'V'),
      },
      result: computed(r[RULE.GAIN] as number, 'a'),
    },
    {
      ...shared,
      id: 'next',
      symbol: { name: 'x', index: k + 1 },
      formula: sign > 0 ? '{from} − {gain} × {difference}' : '{from} + {gain} × {difference}',
      numbers: {
        from: computed(sign * (r[RULE.FROM] as number), 'f'),
        gain: computed(r[RULE.GAIN] as number, 'a'),
        difference: computed(proportion - b),
      },
      result: computed(sign * (r[RULE.NEXT] as number), 'x'),
    },
  ];
}
