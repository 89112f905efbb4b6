import { doseProblem, type Dose } from '@/lib/schemas/dose';
import type { CompiledDesign } from './compiled';
import { canonicalDecimal, decimalToNumber } from './decimal';
import { failure, success, type DesignFailure, type Result } from './result';

/** One evaluable subject: the dose really given, in the trial's unit, and whether there was a response. */
export interface EvaluableSubject {
  readonly given: Dose;
  readonly response: boolean;
}

/** A completed cohort. Not-evaluable subjects are in no count and are not listed; the list may be empty (no step). */
export interface CohortHistory {
  /** Cohort number, 1, 2, … without gaps. */
  readonly number: number;
  /** The dose released (signed) for the cohort. */
  readonly released: Dose;
  /** Whether the signed dose was below the recommendation it was signed for: a stored mark, never judged again. */
  readonly loweredRelease: boolean;
  readonly subjects: readonly EvaluableSubject[];
}

/** The completed cohorts of a trial, in order. */
export interface History {
  readonly cohorts: readonly CohortHistory[];
}

/** Most evaluable subjects a cohort may have in a history. */
export const SUBJECTS_IN_COHORT = 200;
/** Most cohorts of a history. */
export const COHORTS_IN_HISTORY = 1000;

const CANONICAL = /^(?:0|[1-9]\d{0,9})(?:\.\d{0,9}[1-9])?$/;

export type HistoryFailure = Extract<DesignFailure, { code: 'history' }>;

function refuse(path: (string | number)[], message: string): { ok: false; error: HistoryFailure } {
  return failure({ code: 'history', message, path });
}

/** A dose of a history as its double, or why it is none. A decimal written with trailing zeros is the same dose. */
function readDose(dose: unknown, log: boolean): number | string {
  if (typeof dose !== 'string') {
    return 'The dose is not given as text. Give it as an exact decimal such as "12.5".';
  }
  if (!CANONICAL.test(dose)) {
    const problem = doseProblem(dose);
    if (problem !== null) return problem;
  }
  const value = decimalToNumber(dose);
  if (log && value === 0) {
    return 'A dose of 0 has no logarithm, and the design is on the log scale. Correct the dose or amend the scale.';
  }
  return value;
}

/** A checked cohort on the working scale, subjects as they stand in the history. */
export interface WorkingCohort {
  readonly number: number;
  /** w(dose released). */
  readonly released: number;
  readonly lowered: boolean;
  /** w(dose really given) of each subject. */
  readonly given: readonly number[];
  readonly responses: readonly boolean[];
}

/**
 * Checks one cohort of a history against a design and brings it to the working scale.
 *
 * @param position index in the history, for the path of a refusal. @param requireDesignDose refuse a released dose that is
 * no dose of this design (false when a new version is tried on cohorts released under an old one).
 */
export function readCohort(
  compiled: CompiledDesign,
  cohort: CohortHistory,
  position: number,
  requireDesignDose: boolean,
): Result<WorkingCohort, HistoryFailure> {
  const path = ['cohorts', position];
  if (cohort.number !== position + 1) {
    return refuse(
      [...path, 'number'],
      `Cohort ${String(cohort.number)} stands in place ${position + 1}. List the completed cohorts in order, from 1, without gaps.`,
    );
  }
  const log = compiled.design.scale === 'log';
  const released = readDose(cohort.released, log);
  if (typeof released === 'string') return refuse([...path, 'released'], released);
  if (requireDesignDose && compiled.doses.indexOf(canonical(cohort.released)) < 0) {
    return refuse(
      [...path, 'released'],
      `The dose ${cohort.released} released for cohort ${cohort.number} is none of the design's doses. Correct the dose or the design's version.`,
    );
  }
  if (typeof cohort.loweredRelease !== 'boolean') {
    return refuse(
      [...path, 'loweredRelease'],
      `Whether cohort ${cohort.number} was released at a lowered dose is not said. Say true or false.`,
    );
  }
  if (cohort.subjects.length > SUBJECTS_IN_COHORT) {
    return refuse(
      [...path, 'subjects'],
      `Cohort ${cohort.number} lists ${cohort.subjects.length} subjects; at most ${SUBJECTS_IN_COHORT} are read. Check the cohort.`,
    );
  }
  const given: number[] = [];
  const responses: boolean[] = [];
  for (let i = 0; i < cohort.subjects.length; i += 1) {
    const subject = cohort.subjects[i] as EvaluableSubject;
    const value = subject.given === cohort.released ? released : readDose(subject.given, log);
    if (typeof value === 'string') return refuse([...path, 'subjects', i, 'given'], value);
    if (typeof subject.response !== 'boolean') {
      return refuse(
        [...path, 'subjects', i, 'response'],
        `Whether subject ${i + 1} of cohort ${cohort.number} had a response is not said as true or false. Give only evaluable subjects, each with true or false.`,
      );
    }
    given.push(log ? Math.log(value) : value);
    responses.push(subject.response);
  }
  return success({
    number: cohort.number,
    released: log ? Math.log(released) : released,
    lowered: cohort.loweredRelease,
    given,
    responses,
  });
}

/** Refuses a history that is too long to be one. */
export function checkLength(history: History): Result<null, HistoryFailure> {
  if (!Array.isArray(history.cohorts)) {
    return refuse(['cohorts'], 'The completed cohorts are missing. Give a list, empty before the first.');
  }
  if (history.cohorts.length > COHORTS_IN_HISTORY) {
    return refuse(
      ['cohorts'],
      `There are ${history.cohorts.length} cohorts; at most ${COHORTS_IN_HISTORY} are read. Check the history.`,
    );
  }
  return success(null);
}

function canonical(dose: Dose): Dose {
  return CANONICAL.test(dose) ? dose : canonicalDecimal(dose.trim());
}

/**
 * A cohort from counts, all given the released dose: for imports and what-if questions.
 * Refused: counts that are not whole, below zero, or more responses than evaluable subjects.
 */
export function cohortOfCounts(counts: {
  number: number;
  released: Dose;
  evaluable: number;
  responses: number;
  loweredRelease?: boolean;
}): Result<CohortHistory, HistoryFailure> {
  const { number, released, evaluable, responses, loweredRelease = false } = counts;
  const isCount = (value: number) => Number.isInteger(value) && value >= 0 && value <= SUBJECTS_IN_COHORT;
  if (!isCount(evaluable)) {
    return refuse(
      ['evaluable'],
      `The number of evaluable subjects is ${String(evaluable)}; it is a whole number from 0 to ${SUBJECTS_IN_COHORT}. Correct it.`,
    );
  }
  if (!isCount(responses)) {
    return refuse(
      ['responses'],
      `The number of responses is ${String(responses)}; it is a whole number from 0 to ${SUBJECTS_IN_COHORT}. Correct it.`,
    );
  }
  if (responses > evaluable) {
    return refuse(
      ['responses'],
      `There are ${responses} responses among ${evaluable} evaluable subjects; there can be at most ${evaluable}. Correct one of them.`,
    );
  }
  return success({
    number,
    released,
    loweredRelease,
    subjects: Array.from({ length: evaluable }, (_, i) => ({ given: released, response: i < responses })),
  });
}
