import { BOUND, type CompiledDesign } from '../compiled';
import { isTie, midpoint } from '../dose-set';
import { exceedanceProbability } from '../estimate/exceedance';
import { fromWorking } from '../scale';
import { GUARD, PLACE, type TrialState } from '../trial-state';
import {
  computed,
  computedDose,
  exact,
  exactDose,
  posterior,
  probability,
  type ReasonCode,
  type TraceLine,
  type TraceNumber,
  type TraceReason,
  type TraceResult,
} from './line';

const KEPT = { word: 'kept' } as const;
const NOT_REACHED = { word: 'not-reached' } as const;
const OFF = { word: 'off' } as const;

function because(code: ReasonCode, numbers: TraceReason['numbers'] = {}): TraceReason {
  return { code, numbers };
}

function doseAt(compiled: CompiledDesign, index: number): TraceNumber {
  return exactDose(compiled.doses.dose(index));
}

function workingDose(compiled: CompiledDesign, x: number): TraceNumber {
  return computedDose(fromWorking(compiled.design.scale, x));
}

/** The part of a line that tells what a step on doses did: changed from `before` to `after`, or `kept`. */
function effect(
  compiled: CompiledDesign,
  before: number,
  after: number,
  kept: TraceResult,
  reason: TraceReason,
): Pick<TraceLine, 'acted' | 'before' | 'after' | 'result'> & { reason?: TraceReason } {
  const shared = { before: doseAt(compiled, before), after: doseAt(compiled, after) };
  if (before === after) return { ...shared, acted: false, result: kept };
  return { ...shared, acted: true, result: shared.after, reason };
}

/** The lines of steps 2 to 7, one at least for each, read from the registers of the step just made. */
export function guardrailLines(compiled: CompiledDesign, trial: TrialState): TraceLine[] {
  return [
    ...asDoseLines(compiled, trial),
    riseLine(compiled, trial),
    projectionLine(compiled, trial),
    nearestLine(compiled, trial),
    ...riseOnDoseLines(compiled, trial),
    skippingLine(compiled, trial),
    coherenceLine(compiled, trial),
    evaluableLine(compiled, trial),
    closedLine(compiled, trial),
  ];
}

/** The raw value as a dose, where the working scale is not the dose itself. */
function asDoseLines(compiled: CompiledDesign, trial: TrialState): TraceLine[] {
  if (compiled.design.scale === 'linear') return [];
  const raw = trial.guard[GUARD.RAW] as number;
  return [
    {
      id: 'as-dose',
      step: 1,
      formula: 'e^{x}',
      numbers: { x: computed(raw, 'x') },
      result: workingDose(compiled, raw),
      acted: false,
    },
  ];
}

function riseLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const rise = compiled.design.guardrails.largestRise;
  const raw = trial.guard[GUARD.RAW] as number;
  const after = trial.guard[GUARD.AFTER_RISE] as number;
  const shared = { id: 'largest-rise', step: 2, before: computed(raw), after: computed(after) } as const;
  if (rise === null) return { ...shared, formula: '', numbers: {}, result: OFF, acted: false };
  const lower = trial.guard[GUARD.LOWER] as number;
  const bound = workingDose(compiled, trial.guard[GUARD.RISE_BOUND] as number);
  const acted = after !== raw;
  const numbers: Record<string, TraceNumber> =
    rise.kind === 'fold'
      ? { factor: exact(rise.factor), dose: workingDose(compiled, lower), bound }
      : { x: computed(lower, 'g'), step: exact(rise.step), bound };
  return {
    ...shared,
    formula:
      rise.kind === 'fold'
        ? 'at most {factor} × {dose} = {bound} {unit}'
        : 'at most {x} + {step}: {bound} {unit}',
    numbers,
    result: acted ? bound : NOT_REACHED,
    acted,
    ...(acted ? { reason: because('largest-rise-bounds-value') } : {}),
  };
}

function projectionLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const before = trial.guard[GUARD.AFTER_RISE] as number;
  const after = trial.guard[GUARD.PROJECTED] as number;
  const acted = after !== before;
  const ends =
    compiled.design.guardrails.projection === null
      ? { low: doseAt(compiled, 0), high: doseAt(compiled, compiled.doses.count - 1) }
      : {
          low: workingDose(compiled, compiled.bounds[BOUND.LOWEST] as number),
          high: workingDose(compiled, compiled.bounds[BOUND.HIGHEST] as number),
        };
  return {
    id: 'projection',
    step: 3,
    formula: '{low} to {high} {unit}',
    numbers: ends,
    result: acted ? workingDose(compiled, after) : { word: 'inside' },
    acted,
    before: computed(before),
    after: computed(after),
    ...(acted ? { reason: because(after > before ? 'projected-up' : 'projected-down') } : {}),
  };
}

function nearestLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const { doses } = compiled;
  const index = trial.place[PLACE.NEAREST] as number;
  const x = trial.guard[GUARD.PROJECTED] as number;
  const last = doses.count - 1;
  const numbers: Record<string, TraceNumber> = {};
  if (index > 0) numbers.low = workingDose(compiled, midpoint(doses, index - 1));
  if (index < last) numbers.high = workingDose(compiled, midpoint(doses, index));
  const formula =
    index === 0
      ? 'midpoint above {high} {unit}'
      : index === last
        ? 'midpoint below {low} {unit}'
        : 'midpoints {low} and {high} {unit}';
  const tie = isTie(doses, index, x) || isTie(doses, index - 1, x);
  const beyond = x < doses.working(0) || x > doses.working(last);
  const acted = doses.working(index) !== x;
  const code = tie ? (compiled.tiesHigher ? 'tie-higher' : 'tie-lower') : beyond ? 'beyond-ends' : 'rounded';
  return {
    id: 'nearest',
    step: 4,
    formula,
    numbers,
    result: doseAt(compiled, index),
    acted,
    before: workingDose(compiled, x),
    after: doseAt(compiled, index),
    ...(acted ? { reason: because(code) } : {}),
  };
}

function riseOnDoseLines(compiled: CompiledDesign, trial: TrialState): TraceLine[] {
  const before = trial.place[PLACE.NEAREST] as number;
  const after = trial.place[PLACE.ROUNDED] as number;
  if (before === after) return [];
  return [
    {
      id: 'largest-rise',
      step: 4,
      formula: 'rounded {dose} is above {bound} {unit}',
      numbers: {
        dose: doseAt(compiled, before),
        bound: workingDose(compiled, trial.guard[GUARD.RISE_BOUND] as number),
      },
      ...effect(compiled, before, after, KEPT, because('largest-rise-bounds-dose')),
    },
  ];
}

function skippingLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const { noSkipping } = compiled.design.guardrails;
  const before = trial.place[PLACE.ROUNDED] as number;
  const after = trial.place[PLACE.NOT_SKIPPED] as number;
  const changed = effect(compiled, before, after, NOT_REACHED, because('skips-level'));
  if (noSkipping === 'off' || compiled.doses.kind === 'range') {
    return { id: 'no-skipping', step: 5, formula: '', numbers: {}, ...changed, result: OFF };
  }
  const reached = trial.place[noSkipping === 'current' ? PLACE.CURRENT : PLACE.TRIED] as number;
  const limit = Math.min(reached + 1, compiled.doses.count - 1);
  return {
    id: 'no-skipping',
    step: 5,
    formula:
      noSkipping === 'current'
        ? 'current {reached}: up to {limit}'
        : 'highest tried {reached}: up to {limit}',
    numbers: { reached: doseAt(compiled, reached), limit: doseAt(compiled, limit) },
    ...changed,
  };
}

function coherenceLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const { coherence } = compiled.design.guardrails;
  const before = trial.place[PLACE.NOT_SKIPPED] as number;
  const after = trial.place[PLACE.COHERENT] as number;
  const proportion = trial.proportion[trial.steps - 1] as number;
  const atOrAbove = proportion >= compiled.target;
  const changed = effect(
    compiled,
    before,
    after,
    KEPT,
    because(atOrAbove ? 'response-at-or-above-target' : 'response-below-target'),
  );
  if (coherence === 'off') {
    return { id: 'coherence', step: 6, formula: '', numbers: {}, ...changed, result: OFF };
  }
  const binds = atOrAbove || coherence === 'both';
  const downward = atOrAbove === compiled.sign > 0;
  const bound = !binds ? 'no bound' : downward ? 'not above {current}' : 'not below {current}';
  return {
    id: 'coherence',
    step: 6,
    formula: `{proportion} ${atOrAbove ? '≥' : '<'} {target}: ${bound}`,
    numbers: {
      proportion: probability(proportion, 'ȳ'),
      target: exact(compiled.target, 'Γ'),
      current: doseAt(compiled, trial.place[PLACE.CURRENT] as number),
    },
    ...changed,
  };
}

function evaluableLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const before = trial.place[PLACE.COHERENT] as number;
  const after = trial.place[PLACE.ENOUGH] as number;
  const m = trial.size[trial.steps - 1] as number;
  const needed = compiled.design.evaluableForRise;
  return {
    id: 'evaluable',
    step: 6,
    formula: '{m} evaluable, {needed} needed for a rise',
    numbers: { m: exact(m, 'm'), needed: exact(needed) },
    ...effect(compiled, before, after, m >= needed ? { word: 'enough' } : KEPT, because('too-few-evaluable')),
  };
}

function closedLine(compiled: CompiledDesign, trial: TrialState): TraceLine {
  const before = trial.place[PLACE.ENOUGH] as number;
  const after = trial.place[PLACE.FINAL] as number;
  const shared = { id: 'closed', step: 7 } as const;
  const { closing } = compiled;
  if (closing === null) {
    return {
      ...shared,
      formula: '',
      numbers: {},
      ...effect(compiled, before, before, OFF, because('closed')),
    };
  }
  const { settings, target } = closing;
  const judged = judgedDose(compiled, trial);
  const enough = judged.n >= settings.minimumEvaluable;
  const numbers: Record<string, TraceNumber> = {
    dose: judged.dose,
    n: exact(judged.n, 'n'),
    y: exact(judged.y, 'y'),
    minimum: exact(settings.minimumEvaluable),
    target: exact(target, 'Γ'),
    cutoff: exact(settings.cutoff),
    ...(enough
      ? {
          posterior: posterior(
            exceedanceProbability(judged.y, judged.n, target, settings.priorA, settings.priorB),
          ),
        }
      : {}),
  };
  const formula = enough
    ? 'P(p_{dose} > {target}) = {posterior}, cutoff {cutoff}'
    : '{n} of {minimum} evaluable at {dose}';
  const closedFrom = trial.place[PLACE.CLOSED_FROM] as number;
  if (after < 0) {
    return {
      ...shared,
      formula,
      numbers,
      result: { word: 'stop' },
      acted: true,
      before: doseAt(compiled, before),
      reason: because('all-closed'),
    };
  }
  const none = closedFrom >= compiled.doses.count;
  const kept: TraceResult = none ? { word: enough ? 'none' : 'not-judged' } : KEPT;
  return {
    ...shared,
    formula,
    numbers,
    ...effect(compiled, before, after, kept, because('closed', { dose: judged.dose })),
  };
}

/** The dose a closing line shows: the lowest closed one, else the current one, with its evaluable subjects and responses. */
function judgedDose(
  compiled: CompiledDesign,
  trial: TrialState,
): { dose: TraceNumber; n: number; y: number } {
  const { doses } = compiled;
  const closedFrom = trial.place[PLACE.CLOSED_FROM] as number;
  const isClosed = closedFrom < doses.count;
  const lowestOnly = compiled.closing?.settings.scope === 'lowest-level';
  const falling = compiled.sign < 0;
  const current = trial.place[PLACE.CURRENT] as number;
  const index = falling ? doses.count - 1 : lowestOnly ? 0 : isClosed ? closedFrom : current;
  if (doses.kind === 'levels') {
    return {
      dose: doseAt(compiled, index),
      n: trial.levelN[index] as number,
      y: trial.levelY[index] as number,
    };
  }
  return pooled(compiled, trial, index, falling);
}

/** On a range: the subjects given at most dose `index` (at least it where the response falls), pooled. */
function pooled(compiled: CompiledDesign, trial: TrialState, index: number, falling: boolean) {
  const bound = compiled.doses.working(index);
  const closedFrom = trial.place[PLACE.CLOSED_FROM] as number;
  let n = 0;
  let y = 0;
  for (let i = 0; i < trial.groups; i += 1) {
    const x = trial.groupX[i] as number;
    if (falling ? x < bound : x > bound && closedFrom >= compiled.doses.count) continue;
    n += trial.groupN[i] as number;
    y += trial.groupY[i] as number;
    // the first dose given that meets the criterion is the one that closed
    if (!falling && closedFrom < compiled.doses.count && compiled.closing?.isMet(n, y)) {
      return { dose: workingDose(compiled, x), n, y };
    }
  }
  return { dose: doseAt(compiled, index), n, y };
}
