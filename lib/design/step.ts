import { closeDoses } from './close-doses';
import { riseBound, type CompiledDesign } from './compiled';
import { highestAtMost, nearestIndex, TIE_SHARE } from './dose-set';
import { STEP, type StepStatus } from './rules/rule';
import { judgeStop } from './stopping';
import { GUARD, PLACE, RULE, type TrialState } from './trial-state';

/**
 * Completes the cohort at hand: METHODS steps 1 to 8, in order, in the caller's state. The same code serves the
 * recommendation, the next-step table and the simulator; it allocates nothing. The subjects were added with
 * `trial.addSubjects`; `trial.place[PLACE.FINAL]` is the recommended dose (−1: none is left), `trial.stop` the reasons to stop.
 *
 * @param released w(dose released), real. @param lowered whether the signed dose was below its recommendation.
 * @returns how the rule's step ended; unless `done`, the registers hold the state at which it failed.
 */
export function completeCohort(
  compiled: CompiledDesign,
  trial: TrialState,
  released: number,
  lowered: boolean,
): StepStatus {
  if (!recordCohort(compiled, trial, released, lowered)) {
    judgeStop(compiled, trial);
    return STEP.done;
  }
  trial.rule[RULE.BEFORE] = trial.rule[RULE.X] as number;
  const status = compiled.rule.step(compiled.context, trial);
  if (status !== STEP.done) return status;
  guard(compiled, trial);
  judgeStop(compiled, trial);
  return STEP.done;
}

/**
 * Enters the cohort at hand into the counts without a step of the rule (a cohort of an earlier version of the design).
 * Returns false for a cohort without an evaluable subject: nothing but the number of cohorts changes.
 */
export function recordCohort(
  compiled: CompiledDesign,
  trial: TrialState,
  released: number,
  lowered: boolean,
): boolean {
  const { doses, sign } = compiled;
  if (trial.closeCohort(sign) === 0) return false;
  trial.lowered = lowered;
  const given = trial.guard[GUARD.GIVEN] as number;
  const lower = released < given ? released : given;
  trial.guard[GUARD.RELEASED] = released;
  trial.guard[GUARD.LOWER] = lower;
  trial.place[PLACE.CURRENT] = nearestIndex(doses, lower, false);
  if (doses.kind === 'levels') {
    for (let i = 0; i < trial.cohortDoses; i += 1) {
      const level = nearestIndex(doses, trial.cohortX[i] as number, false);
      trial.levelN[level] = (trial.levelN[level] as number) + (trial.cohortN[i] as number);
      trial.levelY[level] = (trial.levelY[level] as number) + (trial.cohortY[i] as number);
    }
    const highestGiven = nearestIndex(doses, trial.cohortX[trial.cohortDoses - 1] as number, false);
    const releasedLevel = nearestIndex(doses, released, false);
    const tried = releasedLevel < highestGiven ? releasedLevel : highestGiven;
    if (tried > (trial.place[PLACE.TRIED] as number)) trial.place[PLACE.TRIED] = tried;
  }
  return true;
}

/** Steps 2 to 7. */
function guard(compiled: CompiledDesign, trial: TrialState): void {
  const { doses, sign } = compiled;
  const { guard: g, place, rule } = trial;
  const raw = sign * (rule[RULE.NEXT] as number);
  const bound = riseBound(compiled, g[GUARD.LOWER] as number);
  const afterRise = raw > bound ? bound : raw;
  const projected =
    afterRise < compiled.lowest
      ? compiled.lowest
      : afterRise > compiled.highest
        ? compiled.highest
        : afterRise;
  g[GUARD.RAW] = raw;
  g[GUARD.RISE_BOUND] = bound;
  g[GUARD.AFTER_RISE] = afterRise;
  g[GUARD.PROJECTED] = projected;
  trial.iterates[trial.steps] = projected;

  const current = place[PLACE.CURRENT] as number;
  const nearest = nearestIndex(doses, projected, compiled.tiesHigher);
  place[PLACE.NEAREST] = nearest;
  place[PLACE.ROUNDED] = withinRise(compiled, nearest, bound, current);
  place[PLACE.NOT_SKIPPED] = withoutSkipping(compiled, trial, place[PLACE.ROUNDED] as number);
  place[PLACE.COHERENT] = coherent(compiled, trial, place[PLACE.NOT_SKIPPED] as number);
  const enough = (trial.size[trial.steps - 1] as number) >= compiled.design.evaluableForRise;
  const coherentIndex = place[PLACE.COHERENT] as number;
  place[PLACE.ENOUGH] = enough || coherentIndex <= current ? coherentIndex : current;

  const previous = place[PLACE.FINAL] as number;
  closeDoses(compiled, trial);
  const final = place[PLACE.FINAL] as number;
  trial.repeats = final >= 0 && trial.repeats > 0 && final === previous ? trial.repeats + 1 : 1;
  if (final < 0) trial.repeats = 0;

  let carried = compiled.carriesProjected ? projected : raw;
  const closedFrom = place[PLACE.CLOSED_FROM] as number;
  if (compiled.carriesProjected && closedFrom > 0 && closedFrom < doses.count) {
    const highestOpen = doses.working(closedFrom - 1);
    if (carried > highestOpen) carried = highestOpen;
  }
  g[GUARD.CARRIED] = carried;
  rule[RULE.X] = sign * carried;
}

/** Step 4, second half: a rounded dose that breaks the largest rise gives way to the highest within it. */
function withinRise(compiled: CompiledDesign, index: number, bound: number, current: number): number {
  const { doses } = compiled;
  if (bound === Infinity || index <= current) return index;
  const x = doses.working(index);
  if (x <= bound + TIE_SHARE * (x - doses.working(index - 1))) return index;
  const highest = highestAtMost(doses, bound);
  return highest > current ? highest : current;
}

/** Step 5. */
function withoutSkipping(compiled: CompiledDesign, trial: TrialState, index: number): number {
  const rule = compiled.design.guardrails.noSkipping;
  if (rule === 'off' || compiled.doses.kind !== 'levels') return index;
  const reached = trial.place[rule === 'current' ? PLACE.CURRENT : PLACE.TRIED] as number;
  return index > reached + 1 ? reached + 1 : index;
}

/** Step 6. */
function coherent(compiled: CompiledDesign, trial: TrialState, index: number): number {
  const rule = compiled.design.guardrails.coherence;
  if (rule === 'off') return index;
  const current = trial.place[PLACE.CURRENT] as number;
  const atOrAbove = (trial.proportion[trial.steps - 1] as number) >= compiled.target;
  const rising = compiled.sign > 0;
  if (atOrAbove) return rising ? Math.min(index, current) : Math.max(index, current);
  if (rule !== 'both') return index;
  return rising ? Math.max(index, current) : Math.min(index, current);
}
