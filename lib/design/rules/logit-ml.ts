import type { SettingsOf } from '@/lib/schemas/design';
import { logit } from '../distributions/logistic';
import { computed, exact, type TraceLine } from '../trace/line';
import { RULE, type TrialState } from '../trial-state';
import { differenceLine, givenLine, observedLine } from './lines';
import { STEP, statusOfNext, type Rule, type StepContext, type StepStatus } from './rule';

const SOURCE = 'Wu (1985), J. Am. Stat. Assoc. 80:974–984';
const FIRTH_SOURCE = `${SOURCE}; penalty of Firth (1993), Biometrika 80:27–38`;

/** The method of the last step (see `FIT_METHOD`), its estimates, and the value before the largest move bound it. */
export const LOGIT = {
  METHOD: RULE.OWN,
  INTERCEPT: RULE.OWN + 1,
  SLOPE: RULE.OWN + 2,
  UNLIMITED: RULE.OWN + 3,
} as const;
export const FIT_METHOD = { fallback: 0, maximumLikelihood: 1, firth: 2 } as const;

/** A fitted slope at most this has no usable quantile. */
export const SMALLEST_SLOPE = 1e-8;

/**
 * Wu 1985: the fitted Γ-quantile of logit P = α + β_L x over all subjects at doses really given; where no finite maximum
 * exists Firth's fit, if chosen; else x̃_k − (c/k) e_k. Decided afresh each cohort, limited to x̃_k ± the largest move.
 */
export const logitMl: Rule<'logit-ml'> = {
  name: 'logit-ml',
  about: {
    title: 'Logit maximum likelihood',
    source: SOURCE,
    suits:
      'Suits a continuous range where the response curve is believed to be logistic near the target; it uses all subjects at the doses really given.',
  },
  carriesProjected: () => false,
  initialise(_settings, x1, trial) {
    trial.rule.fill(0);
    trial.rule[RULE.X] = x1;
  },
  step({ settings, target, sign }, trial) {
    const r = trial.rule;
    const last = trial.steps - 1;
    const given = trial.given[last] as number;
    const status = fit(settings.firth, sign, trial);
    if (status !== STEP.done) return status;
    const unlimited =
      r[LOGIT.METHOD] === FIT_METHOD.fallback
        ? given - (settings.c / trial.steps) * ((trial.proportion[last] as number) - target)
        : (logit(target) - (r[LOGIT.INTERCEPT] as number)) / (r[LOGIT.SLOPE] as number);
    const lowest = given - settings.largestMove;
    const highest = given + settings.largestMove;
    r[LOGIT.UNLIMITED] = unlimited;
    r[RULE.INDEX] = trial.steps;
    r[RULE.GAIN] = settings.c / trial.steps;
    r[RULE.FROM] = given;
    r[RULE.NEXT] = unlimited;
    const finite = statusOfNext(trial);
    if (finite !== STEP.done) return finite;
    r[RULE.NEXT] = unlimited < lowest ? lowest : unlimited > highest ? highest : unlimited;
    return statusOfNext(trial);
  },
  explain(context, trial) {
    return [
      observedLine(trial),
      givenLine(context.sign, trial),
      differenceLine(context.target, trial),
      ...quantileLines(context, trial),
    ];
  },
  numbers: (trial) => ({
    index: trial.rule[RULE.INDEX] as number,
    method: trial.rule[LOGIT.METHOD] as number,
    intercept: trial.rule[LOGIT.INTERCEPT] as number,
    slope: trial.rule[LOGIT.SLOPE] as number,
  }),
};

/** Fits on s·x; leaves method and estimates in the registers. */
function fit(firth: boolean, sign: 1 | -1, trial: TrialState): StepStatus {
  const regression = trial.logit();
  const r = trial.rule;
  regression.clear();
  for (let i = 0; i < trial.groups; i += 1) {
    regression.add(sign * (trial.groupX[i] as number), trial.groupN[i] as number, trial.groupY[i] as number);
  }
  r[LOGIT.METHOD] = FIT_METHOD.fallback;
  const outcome = regression.fit('maximum-likelihood');
  const status = regression.status;
  r[LOGIT.INTERCEPT] = regression.intercept;
  r[LOGIT.SLOPE] = regression.slope;
  if (outcome === 'not-converged') return STEP.notConverged;
  if (outcome === 'fitted' && regression.slope > SMALLEST_SLOPE) {
    r[LOGIT.METHOD] = FIT_METHOD.maximumLikelihood;
    return STEP.done;
  }
  const bothSeen = status !== 'all-nonresponse' && status !== 'all-response' && status !== 'single-dose';
  if (!firth || !bothSeen) return STEP.done;
  const penalised = regression.fit('firth');
  r[LOGIT.INTERCEPT] = regression.intercept;
  r[LOGIT.SLOPE] = regression.slope;
  if (penalised === 'not-converged') return STEP.notConverged;
  if (penalised === 'fitted' && regression.slope > SMALLEST_SLOPE) r[LOGIT.METHOD] = FIT_METHOD.firth;
  return STEP.done;
}

function quantileLines(
  { settings, target, sign }: StepContext<SettingsOf<'logit-ml'>>,
  trial: TrialState,
): TraceLine[] {
  const r = trial.rule;
  const k = trial.steps;
  const given = computed(sign * (trial.given[k - 1] as number), 'x̃');
  const unlimited = computed(sign * (r[LOGIT.UNLIMITED] as number), 'x');
  const next = computed(sign * (r[RULE.NEXT] as number), 'x');
  const limited = next.value !== unlimited.value;
  const method = r[LOGIT.METHOD];
  const source = method === FIT_METHOD.firth ? FIRTH_SOURCE : SOURCE;
  const shared = { step: 1, symbol: { name: 'x', index: k + 1 }, source } as const;
  const fitted: TraceLine =
    method === FIT_METHOD.fallback
      ? {
          ...shared,
          id: 'fit',
          formula: `{given} ${sign > 0 ? '−' : '+'} ({c} / {k}) × {difference}`,
          numbers: {
            given,
            c: exact(settings.c, 'c'),
            k: exact(k, 'k'),
            difference: computed((trial.proportion[k - 1] as number) - target, 'e'),
          },
          result: unlimited,
          acted: true,
          reason: { code: 'no-fit', numbers: {} },
        }
      : {
          ...shared,
          id: 'fit',
          formula: '(ln({target} / (1 − {target})) − {intercept}) / {slope}',
          numbers: {
            target: exact(target, 'Γ'),
            intercept: computed(r[LOGIT.INTERCEPT] as number, 'α'),
            // the fit runs on s·x, so the slope changes sign with it
            slope: computed(sign * (r[LOGIT.SLOPE] as number), 'β_L'),
          },
          result: unlimited,
          acted: method === FIT_METHOD.firth,
          ...(method === FIT_METHOD.firth ? { reason: { code: 'firth-fit', numbers: {} } as const } : {}),
        };
  return [
    fitted,
    {
      ...shared,
      id: 'next',
      formula: 'within {given} ± {move}',
      numbers: { given, move: exact(settings.largestMove) },
      result: next,
      acted: limited,
      before: unlimited,
      after: next,
      ...(limited ? { reason: { code: 'move-limited', numbers: {} } as const } : {}),
    },
  ];
}
