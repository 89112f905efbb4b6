import type { SettingsOf } from '@/lib/schemas/design';
import { RULE } from '../trial-state';
import { differenceLine, gainLine, moveLine, observedLine, startLines } from './lines';
import { startingValue, statusOf, type Rule } from './rule';

const SOURCE = 'Robbins & Monro (1951), Ann. Math. Stat. 22:400–407';

/** a = c/(index + k0)^γ, in working-scale units per unit of probability. */
export function gainAt(settings: { c: number; k0: number; gamma: number }, index: number): number {
  return settings.c / Math.pow(index + settings.k0, settings.gamma);
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
  step({ settings, target, sign }, trial) {
    const r = trial.rule;
    const index = (r[RULE.INDEX] as number) + 1;
    const gain = gainAt(settings, index);
    const from = startingValue(settings.carry, sign, trial);
    r[RULE.INDEX] = index;
    r[RULE.GAIN] = gain;
    r[RULE.FROM] = from;
    const next = from - gain * ((trial.proportion[trial.steps - 1] as number) - target);
    r[RULE.NEXT] = next;
    return statusOf(next);
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

export type RobbinsMonroSettings = SettingsOf<'robbins-monro'>;
