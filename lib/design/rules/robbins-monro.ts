import { RULE, type TrialState } from '../trial-state';
import { differenceLine, gainLine, moveLine, observedLine, startLines } from './lines';
import { enterStart, statusOfNext, type Rule } from './rule';

const SOURCE = 'Robbins & Monro (1951), Ann. Math. Stat. 22:400–407';

type GainSettings = { readonly c: number; readonly k0: number; readonly gamma: number };

/** a = c/(index + k0)^γ, in working-scale units per unit of probability. */
export function gainAt(settings: GainSettings, index: number): number {
  return settings.c / Math.pow(index + settings.k0, settings.gamma);
}

/** a_k of the index in its register into that of the gain. */
export function enterGain(settings: GainSettings, trial: TrialState): void {
  const r = trial.rule;
  r[RULE.GAIN] = settings.c / Math.pow((r[RULE.INDEX] as number) + settings.k0, settings.gamma);
}

/** x_{k+1} = f_k − a_k e_k from the registers of f_k and a_k into that of the next value. */
export function enterMove(context: { readonly target: number }, trial: TrialState): void {
  const r = trial.rule;
  const error = (trial.proportion[trial.steps - 1] as number) - context.target;
  r[RULE.NEXT] = (r[RULE.FROM] as number) - (r[RULE.GAIN] as number) * error;
}

/** Robbins & Monro 1951: x_{k+1} = f_k − a_k e_k, a_k = c/(k + k0)^γ. */
export const robbinsMonro: Rule<'robbins-monro'> = {
  name: 'robbins-monro',
  about: {
    title: 'Robbins–Monro',
    source: SOURCE,
    suits:
      'Suits a target between 0.25 and 0.75 with a good starting dose and a gain constant near 1/D, the inverse of the believed slope at the target.',
  },
  carriesProjected: () => true,
  initialise(_settings, x1, trial) {
    trial.rule.fill(0);
    trial.rule[RULE.X] = x1;
  },
  step(context, trial) {
    trial.rule[RULE.INDEX] = (trial.rule[RULE.INDEX] as number) + 1;
    enterGain(context.settings, trial);
    enterStart(context.settings.carry, context.sign, trial);
    enterMove(context, trial);
    return statusOfNext(trial);
  },
  explain(context, trial) {
    return [
      observedLine(trial),
      differenceLine(context.target, trial),
      ...startLines(context, context.settings.carry, trial),
      gainLine(context.settings, trial, SOURCE),
      moveLine(context, trial, SOURCE),
    ];
  },
  numbers: (trial) => ({ index: trial.rule[RULE.INDEX] as number, gain: trial.rule[RULE.GAIN] as number }),
};
