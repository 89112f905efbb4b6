import { computed, exact, probability, signed, type TraceLine } from '../trace/line';
import { GUARD, RULE, type TrialState } from '../trial-state';
import type { StepContext } from './rule';

/** ȳ_k = y/m of the last step. */
export function observedLine(trial: TrialState): TraceLine {
  const k = trial.steps;
  const proportion = trial.proportion[k - 1] as number;
  const m = trial.size[k - 1] as number;
  return {
    id: 'observed',
    step: 0,
    symbol: { name: 'ȳ', index: k },
    formula: '{responses} / {subjects}',
    // y is whole; y/m times m may miss it by a rounding error
    numbers: { responses: exact(Math.round(proportion * m), 'y'), subjects: exact(m, 'm') },
    result: probability(proportion, 'ȳ'),
    acted: false,
  };
}

/** e_k = ȳ_k − Γ. */
export function differenceLine(target: number, trial: TrialState): TraceLine {
  const proportion = trial.proportion[trial.steps - 1] as number;
  return {
    id: 'difference',
    step: 0,
    symbol: { name: 'e', index: trial.steps },
    formula: '{proportion} − {target}',
    numbers: { proportion: probability(proportion, 'ȳ'), target: exact(target, 'Γ') },
    result: signed(proportion - target, 'e'),
    acted: false,
  };
}

/** x̃_k, the mean working value of the doses really given. */
export function givenLine(sign: 1 | -1, trial: TrialState): TraceLine {
  const k = trial.steps;
  return {
    id: 'given',
    step: 0,
    symbol: { name: 'x̃', index: k },
    formula: 'mean over {subjects} subjects',
    numbers: { subjects: exact(trial.size[k - 1] as number, 'm') },
    result: computed(sign * (trial.given[k - 1] as number), 'x̃'),
    acted: false,
  };
}

/**
 * The value a step starts from, where it is not simply the carried one: after a lowered release, or where the dose given
 * is carried.
 */
export function startLines(
  { sign }: StepContext<unknown>,
  carry: 'iterate' | 'given',
  trial: TrialState,
): TraceLine[] {
  const k = trial.steps;
  const x = computed(sign * (trial.rule[RULE.BEFORE] as number), 'x');
  const given = computed(trial.guard[GUARD.GIVEN] as number, 'x̃');
  const from = computed(sign * (trial.rule[RULE.FROM] as number), 'f');
  if (carry === 'given') {
    return [
      {
        id: 'start',
        step: 1,
        symbol: { name: 'f', index: k },
        formula: 'x̃_[k], the mean dose given',
        numbers: {},
        result: from,
        acted: false,
        before: x,
        after: from,
      },
    ];
  }
  if (!trial.lowered) return [];
  return [
    {
      id: 'start',
      step: 1,
      symbol: { name: 'f', index: k },
      formula: 'the lower of {x} and {given}',
      numbers: { x, given },
      result: from,
      acted: from.value !== x.value,
      before: x,
      after: from,
      reason: { code: 'lowered-release', numbers: {} },
    },
  ];
}

/** a_k = c/(index + k0)^γ. */
export function gainLine(
  settings: { c: number; k0: number; gamma: number },
  trial: TrialState,
  source: string,
): TraceLine {
  const base = settings.k0 === 0 ? '{index}' : '({index} + {k0})';
  return {
    id: 'gain',
    step: 1,
    symbol: { name: 'a', index: trial.steps },
    formula: settings.gamma === 1 ? `{c} / ${base}` : `{c} / ${base}^{gamma}`,
    numbers: {
      c: exact(settings.c, 'c'),
      index: exact(trial.rule[RULE.INDEX] as number, 'k'),
      k0: exact(settings.k0, 'k0'),
      gamma: exact(settings.gamma, 'γ'),
    },
    result: computed(trial.rule[RULE.GAIN] as number, 'a'),
    source,
    acted: false,
  };
}

/** x_{k+1} = f_k − s a_k e_k, in real doses. */
export function moveLine(
  { sign, target }: StepContext<unknown>,
  trial: TrialState,
  source: string,
): TraceLine {
  const k = trial.steps;
  return {
    id: 'next',
    step: 1,
    symbol: { name: 'x', index: k + 1 },
    formula: sign > 0 ? '{from} − {gain} × {difference}' : '{from} + {gain} × {difference}',
    numbers: {
      from: computed(sign * (trial.rule[RULE.FROM] as number), 'f'),
      gain: computed(trial.rule[RULE.GAIN] as number, 'a'),
      difference: computed((trial.proportion[k - 1] as number) - target, 'e'),
    },
    result: computed(sign * (trial.rule[RULE.NEXT] as number), 'x'),
    source,
    acted: false,
  };
}
