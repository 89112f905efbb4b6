import { RULE, type TrialState } from '../trial-state';
import { computed, exact, type TraceLine } from '../trace/line';
import { differenceLine, gainLine, moveLine, observedLine, startLines } from './lines';
import { enterGain, enterMove } from './robbins-monro';
import { enterStart, statusOfNext, type Rule } from './rule';

const SOURCE = 'Kesten (1958), Ann. Math. Stat. 29:41–59';

/** Steps since the rule started; e of the last cohort and of the one before, as used for the index. */
const COUNT = RULE.OWN;
const LAST = RULE.OWN + 1;
const BEFORE_LAST = RULE.OWN + 2;
const USED_LAST = RULE.OWN + 3;
const USED_BEFORE = RULE.OWN + 4;

/**
 * Kesten 1958: the gain's index κ moves on only when the sign of e has changed: κ_1 = 1, κ_2 = 2,
 * κ_k = 2 + #{i = 3…k : e_{i−1} e_{i−2} ≤ 0}; it is known before the cohort's outcomes.
 */
export const kesten: Rule<'kesten'> = {
  name: 'kesten',
  about: {
    title: 'Kesten’s acceleration',
    source: SOURCE,
    suits:
      'Suits a starting dose that may be far off: steps stay long while all cohorts point the same way. Weak for extreme targets, where long runs are normal.',
  },
  carriesProjected: () => true,
  initialise(_settings, x1, trial) {
    trial.rule.fill(0);
    trial.rule[RULE.X] = x1;
  },
  step(context, trial) {
    const r = trial.rule;
    const count = (r[COUNT] as number) + 1;
    const changed = (r[LAST] as number) * (r[BEFORE_LAST] as number) <= 0;
    const index = count <= 2 ? count : (r[RULE.INDEX] as number) + (changed ? 1 : 0);
    r[COUNT] = count;
    r[USED_LAST] = r[LAST] as number;
    r[USED_BEFORE] = r[BEFORE_LAST] as number;
    r[BEFORE_LAST] = r[LAST] as number;
    r[LAST] = (trial.proportion[trial.steps - 1] as number) - context.target;
    r[RULE.INDEX] = index;
    enterGain(context.settings, trial);
    enterStart(context.settings.carry, context.sign, trial);
    enterMove(context, trial);
    return statusOfNext(trial);
  },
  explain(context, trial) {
    return [
      observedLine(trial),
      differenceLine(context.target, trial),
      indexLine(trial),
      ...startLines(context, context.settings.carry, trial),
      gainLine(context.settings, trial, SOURCE),
      moveLine(context, trial, SOURCE),
    ];
  },
  numbers: (trial) => ({
    index: trial.rule[RULE.INDEX] as number,
    gain: trial.rule[RULE.GAIN] as number,
    lastDifference: trial.rule[LAST] as number,
    differenceBefore: trial.rule[BEFORE_LAST] as number,
  }),
};

function indexLine(trial: TrialState): TraceLine {
  const r = trial.rule;
  const count = r[COUNT] as number;
  return {
    id: 'kesten-index',
    step: 1,
    symbol: { name: 'κ', index: trial.steps },
    formula: count <= 2 ? '{count}' : '{last} × {before}',
    numbers:
      count <= 2
        ? { count: exact(count, 'k') }
        : { last: computed(r[USED_LAST] as number, 'e'), before: computed(r[USED_BEFORE] as number, 'e') },
    result: exact(r[RULE.INDEX] as number, 'κ'),
    source: SOURCE,
    acted: false,
  } as const;
}
