import { closeDoses } from './close-doses';
import { BOUND, type CompiledDesign } from './compiled';
import { highestAtMost, nearestIndexAt, TIE_SHARE } from './dose-set';
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
  trial.guard[GUARD.RELEASED] = released;
  return complete(compiled, trial, lowered);
}

/** {@link completeCohort} for a cohort released at design dose `index` (no double changes hands). */
export function completeCohortAt(
  compiled: CompiledDesign,
  trial: TrialState,
  index: number,
  lowered: boolean,
): StepStatus {
  trial.guard[GUARD.RELEASED] = compiled.doses.workings[index] as number;
  return complete(compiled, trial, lowered);
}

function complete(compiled: CompiledDesign, trial: TrialState, lowered: boolean): StepStatus {
  if (!record(compiled, trial, lowered)) {
    judgeStop(compiled, trial);
    return STEP.done;
  }
  trial.rule[RULE.BEFORE] = trial.rule[RULE.X] as number;
  const status = compiled.rule.step(compiled.context, trial);
  if (status !== STEP.done) return status;
  boundValue(compiled, trial);
  placeDose(compiled, trial);
  carry(compiled, trial);
  judgeStop(compiled, trial);
  return STEP.done;
}

/**
 * Enters the cohort at hand into the counts without a step of the rule (a cohort of an earlier version of the design).
 * Returns false for a cohort without an evaluable subject: nothing but the number of cohorts changes.
 *
 * @param released w(dose released), real.
 */
export function recordCohort(
  compiled: CompiledDesign,
  trial: TrialState,
  released: number,
  lowered: boolean,
): boolean {
  trial.guard[GUARD.RELEASED] = released;
  return record(compiled, trial, lowered);
}

function record(compiled: CompiledDesign, trial: TrialState, lowered: boolean): boolean {
  if (trial.closeCohort(compiled.sign) === 0) return false;
  const { guard, place } = trial;
  const { workings } = compiled.doses;
  trial.lowered = lowered;
  const released = guard[GUARD.RELEASED] as number;
  const given = guard[GUARD.GIVEN] as number;
  guard[GUARD.LOWER] = released < given ? released : given;
  place[PLACE.CURRENT] = nearestIndexAt(workings, guard, GUARD.LOWER, false);
  if (compiled.doses.kind === 'levels') {
    const { levelN, levelY, cohortX, cohortN, cohortY, cohortDoses } = trial;
    let level = 0;
    for (let i = 0; i < cohortDoses; i += 1) {
      level = nearestIndexAt(workings, cohortX, i, false);
      levelN[level] = (levelN[level] as number) + (cohortN[i] as number);
      levelY[level] = (levelY[level] as number) + (cohortY[i] as number);
    }
    // the cohort's doses rise, so `level` is now that of its highest
    const releasedLevel = nearestIndexAt(workings, guard, GUARD.RELEASED, false);
    const tried = releasedLevel < level ? releasedLevel : level;
    if (tried > (place[PLACE.TRIED] as number)) place[PLACE.TRIED] = tried;
  }
  return true;
}

/** Steps 2 and 3: from the raw value to the projected one. */
function boundValue(compiled: CompiledDesign, trial: TrialState): void {
  const { guard, rule } = trial;
  const { bounds } = compiled;
  const lowest = bounds[BOUND.LOWEST] as number;
  const highest = bounds[BOUND.HIGHEST] as number;
  const raw = compiled.sign * (rule[RULE.NEXT] as number);
  const bound =
    (guard[GUARD.LOWER] as number) * (bounds[BOUND.RISE_TIMES] as number) +
    (bounds[BOUND.RISE_ADD] as number);
  const afterRise = raw > bound ? bound : raw;
  const projected = afterRise < lowest ? lowest : afterRise > highest ? highest : afterRise;
  guard[GUARD.RAW] = raw;
  guard[GUARD.RISE_BOUND] = bound;
  guard[GUARD.AFTER_RISE] = afterRise;
  guard[GUARD.PROJECTED] = projected;
  trial.iterates[trial.steps] = projected;
}

/** Steps 4 to 7: from the projected value to the recommended dose. */
function placeDose(compiled: CompiledDesign, trial: TrialState): void {
  const { guard, place } = trial;
  const current = place[PLACE.CURRENT] as number;
  place[PLACE.NEAREST] = nearestIndexAt(compiled.doses.workings, guard, GUARD.PROJECTED, compiled.tiesHigher);
  place[PLACE.ROUNDED] = withinRise(compiled, trial);
  place[PLACE.NOT_SKIPPED] = withoutSkipping(compiled, trial);
  const coherentIndex = coherent(compiled, trial);
  place[PLACE.COHERENT] = coherentIndex;
  const enough = (trial.size[trial.steps - 1] as number) >= compiled.design.evaluableForRise;
  place[PLACE.ENOUGH] = enough || coherentIndex <= current ? coherentIndex : current;
  const previous = place[PLACE.FINAL] as number;
  closeDoses(compiled, trial);
  const final = place[PLACE.FINAL] as number;
  trial.repeats = final < 0 ? 0 : trial.repeats > 0 && final === previous ? trial.repeats + 1 : 1;
}

/** What the rule goes on from: the projected value at most the highest open dose, or its raw value (rules 4, 5 `mean`, 6). */
function carry(compiled: CompiledDesign, trial: TrialState): void {
  const { guard, rule, place } = trial;
  let carried = guard[compiled.carriesProjected ? GUARD.PROJECTED : GUARD.RAW] as number;
  const closedFrom = place[PLACE.CLOSED_FROM] as number;
  if (compiled.carriesProjected && closedFrom > 0 && closedFrom < compiled.doses.count) {
    const highestOpen = compiled.doses.workings[closedFrom - 1] as number;
    if (carried > highestOpen) carried = highestOpen;
  }
  guard[GUARD.CARRIED] = carried;
  rule[RULE.X] = compiled.sign * carried;
}

/** Step 4, second half: a rounded dose that breaks the largest rise gives way to the highest within it. */
function withinRise(compiled: CompiledDesign, trial: TrialState): number {
  const { workings } = compiled.doses;
  const index = trial.place[PLACE.NEAREST] as number;
  const current = trial.place[PLACE.CURRENT] as number;
  if (index <= current) return index;
  const x = workings[index] as number;
  const gap = x - (workings[index - 1] as number);
  if (x <= (trial.guard[GUARD.RISE_BOUND] as number) + TIE_SHARE * gap) return index;
  const highest = highestAtMost(workings, trial.guard, GUARD.RISE_BOUND);
  return highest > current ? highest : current;
}

/** Step 5. */
function withoutSkipping(compiled: CompiledDesign, trial: TrialState): number {
  const index = trial.place[PLACE.ROUNDED] as number;
  const rule = compiled.design.guardrails.noSkipping;
  if (rule === 'off' || compiled.doses.kind !== 'levels') return index;
  const reached = trial.place[rule === 'current' ? PLACE.CURRENT : PLACE.TRIED] as number;
  return index > reached + 1 ? reached + 1 : index;
}

/** Step 6. */
function coherent(compiled: CompiledDesign, trial: TrialState): number {
  const index = trial.place[PLACE.NOT_SKIPPED] as number;
  const rule = compiled.design.guardrails.coherence;
  if (rule === 'off') return index;
  const current = trial.place[PLACE.CURRENT] as number;
  const atOrAbove = (trial.proportion[trial.steps - 1] as number) >= compiled.target;
  const rising = compiled.sign > 0;
  if (atOrAbove) return rising ? Math.min(index, current) : Math.max(index, current);
  if (rule !== 'both') return index;
  return rising ? Math.max(index, current) : Math.min(index, current);
}
