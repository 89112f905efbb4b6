import type { Design } from '@/lib/schemas/design';
import { compileDesign, newTrial, startRule, workingOf, type CompiledDesign } from './compiled';
import { checkLength, readCohort, type History, type WorkingCohort } from './history';
import { failure, success, type DesignFailure, type FailureState, type Result } from './result';
import { STEP, type StepStatus } from './rules/rule';
import { fromWorking } from './scale';
import { completeCohort, recordCohort } from './step';
import { PLACE, RULE, type TrialState } from './trial-state';

/** A version of a trial's design and the first cohort whose step it governs (1 for the first version). */
export interface DesignVersion {
  readonly fromCohort: number;
  readonly design: Design;
}

/** A trial as it stands after the last cohort of a history. */
export interface ReplayedTrial {
  readonly compiled: CompiledDesign;
  readonly trial: TrialState;
}

export interface ReplayOptions {
  /**
   * False to try a design on cohorts whose released doses need not be its own (another version, another rule's doses).
   * Default true: such a history is refused.
   */
  readonly requireDesignDoses?: boolean;
  /** Called after each cohort with the state as it then stands. */
  readonly afterCohort?: (compiled: CompiledDesign, trial: TrialState, cohort: WorkingCohort) => void;
}

/**
 * Runs a history through steps 1 to 8, cohort by cohort, with doses really given and the stored marks (METHODS,
 * "Corrections"). With several versions each cohort's step is made under the version in force for it ("Amendments"):
 * guardrails and rules 4, 5 (`mean`) and 6 use all cohorts; rules 1, 2, 3 and 5 (`last`) go on where rule, Γ, direction and
 * scale are the same and start afresh at w(released dose) otherwise.
 *
 * @param versions in order of `fromCohort`, the first from cohort 1. Versions that start after the last cohort are not
 * used: the recommendation after cohort K is made under the version of cohort K.
 * @throws RangeError when the versions are not in that order.
 */
export function replay(
  versions: readonly DesignVersion[],
  history: History,
  options: ReplayOptions = {},
): Result<ReplayedTrial, DesignFailure> {
  const requireDesignDoses = options.requireDesignDoses ?? true;
  checkVersions(versions);
  const length = checkLength(history);
  if (!length.ok) return length;
  let version = 0;
  let compiled = compileDesign((versions[0] as DesignVersion).design);
  let trial = newTrial(compiled);
  for (let i = 0; i < history.cohorts.length; i += 1) {
    const upcoming = versions[version + 1];
    if (upcoming !== undefined && upcoming.fromCohort === i + 1) {
      version += 1;
      const switched = switchVersion(compiled, trial, upcoming.design, history, i);
      if (!switched.ok) return switched;
      ({ compiled, trial } = switched.value);
    }
    const read = readCohort(
      compiled,
      history.cohorts[i] as History['cohorts'][number],
      i,
      requireDesignDoses,
    );
    if (!read.ok) return read;
    enterCohort(trial, read.value);
    const status = completeCohort(compiled, trial, read.value.released, read.value.lowered);
    if (status !== STEP.done) return failure(stepFailure(status, compiled, trial));
    options.afterCohort?.(compiled, trial, read.value);
  }
  return success({ compiled, trial });
}

function checkVersions(versions: readonly DesignVersion[]): void {
  if (versions[0]?.fromCohort !== 1) throw new RangeError('The first version starts at cohort 1.');
  versions.forEach((version, i) => {
    const before = versions[i - 1];
    if (before !== undefined && version.fromCohort <= before.fromCohort) {
      throw new RangeError('Versions stand in the order of their first cohorts.');
    }
  });
}

function enterCohort(trial: TrialState, cohort: WorkingCohort): void {
  trial.beginCohort();
  for (let i = 0; i < cohort.given.length; i += 1) {
    trial.addSubjects(cohort.given[i] as number, 1, cohort.responses[i] === true ? 1 : 0);
  }
}

/** Brings a trial under a new version of its design before cohort `next` (index in the history). */
function switchVersion(
  old: CompiledDesign,
  before: TrialState,
  design: Design,
  history: History,
  next: number,
): Result<ReplayedTrial, DesignFailure> {
  const compiled = compileDesign(design);
  const trial = newTrial(compiled);
  trial.reserve(before.steps, before.groups);
  for (let i = 0; i < next; i += 1) {
    const read = readCohort(compiled, history.cohorts[i] as History['cohorts'][number], i, false);
    if (!read.ok) return read;
    enterCohort(trial, read.value);
    recordCohort(compiled, trial, read.value.released, read.value.lowered);
  }
  for (let i = 0; i <= before.steps; i += 1) {
    const dose = fromWorking(old.design.scale, before.iterates[i] as number);
    trial.iterates[i] = workingOf(compiled, dose);
  }
  const last = before.place[PLACE.FINAL] as number;
  trial.place[PLACE.FINAL] = last < 0 ? -1 : compiled.doses.indexOf(old.doses.dose(last));
  trial.repeats = (trial.place[PLACE.FINAL] as number) < 0 ? 0 : before.repeats;
  if (continues(old.design, design)) {
    trial.rule.set(before.rule);
  } else {
    const read = readCohort(compiled, history.cohorts[next] as History['cohorts'][number], next, false);
    if (!read.ok) return read;
    startRule(compiled, trial, read.value.released);
    trial.iterates[trial.steps] = read.value.released;
  }
  return success({ compiled, trial });
}

function continues(old: Design, design: Design): boolean {
  const sameForm =
    old.rule.name !== 'adaptive-slope' ||
    design.rule.name !== 'adaptive-slope' ||
    old.rule.form === design.rule.form;
  return (
    old.rule.name === design.rule.name &&
    sameForm &&
    old.target === design.target &&
    old.response.direction === design.response.direction &&
    old.scale === design.scale
  );
}

/** A rule's step that did not end in a number, with the registers at which it failed. */
export function stepFailure(
  status: StepStatus,
  compiled: CompiledDesign,
  trial: TrialState,
): Extract<DesignFailure, { cohort: number }> {
  const k = trial.steps;
  const show = (value: number) => (Number.isFinite(value) ? value : String(value));
  const state: Record<string, number | string> = {
    step: k,
    proportion: show(trial.proportion[k - 1] as number),
    given: show(compiled.sign * (trial.given[k - 1] as number)),
    carried: show(compiled.sign * (trial.rule[RULE.X] as number)),
    next: show(compiled.sign * (trial.rule[RULE.NEXT] as number)),
  };
  for (const [name, value] of Object.entries(compiled.rule.numbers(trial))) state[name] = show(value);
  const shared = { cohort: trial.cohorts, state: state as FailureState };
  if (status === STEP.overflow) {
    return {
      ...shared,
      code: 'overflow',
      message: `The value after cohort ${trial.cohorts} is too large to compute. Check the rule's settings against the doses.`,
    };
  }
  if (status === STEP.notANumber) {
    return {
      ...shared,
      code: 'not-a-number',
      message: `The value after cohort ${trial.cohorts} is not a number. Check the rule's settings against the doses.`,
    };
  }
  return {
    ...shared,
    code: 'not-converged',
    message: `The fit after cohort ${trial.cohorts} did not settle. Ask the statistician; the state of the fit is recorded.`,
  };
}
