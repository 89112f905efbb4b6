import { BinaryRegression } from './estimate/binary-regression';

/** Registers of a rule: the value carried, the value it asks for, and what it was computed from. */
export const RULE = {
  /** x_k on entry to a step (mirrored where the response falls), x_{k+1} after it. */
  X: 0,
  /** The rule's raw value, before steps 2 and 3. */
  NEXT: 1,
  /** f_k, the value the step starts from. */
  FROM: 2,
  /** a_k. */
  GAIN: 3,
  /** The index of the gain: k, or Kesten's κ. */
  INDEX: 4,
  /** x_k as it stood before the step just made. */
  BEFORE: 5,
  /** First register of a rule's own. */
  OWN: 6,
} as const;
const RULE_REGISTERS = 16;

/** Registers of steps 2 to 7, real values on the working scale. */
export const GUARD = {
  RELEASED: 0,
  GIVEN: 1,
  LOWER: 2,
  RAW: 3,
  RISE_BOUND: 4,
  AFTER_RISE: 5,
  PROJECTED: 6,
  CARRIED: 7,
} as const;
const GUARD_REGISTERS = 8;

/** Dose indices after each step; −1 is none. */
export const PLACE = {
  CURRENT: 0,
  TRIED: 1,
  NEAREST: 2,
  ROUNDED: 3,
  NOT_SKIPPED: 4,
  COHERENT: 5,
  ENOUGH: 6,
  /** Lowest closed dose, or the number of doses when none is closed. */
  CLOSED_FROM: 7,
  /** The recommended dose. */
  FINAL: 8,
} as const;
const PLACE_REGISTERS = 9;

/**
 * All numbers of a trial under one design, owned by the caller and changed in place, so that a step allocates nothing.
 * Doses here are working values; where the response falls with dose, `given` and the rule's registers are mirrored (−x).
 */
export class TrialState {
  readonly rule = new Float64Array(RULE_REGISTERS);
  readonly guard = new Float64Array(GUARD_REGISTERS);
  readonly place = new Int32Array(PLACE_REGISTERS);

  /** Cohorts completed, those without an evaluable subject included. */
  cohorts = 0;
  /** Steps made: cohorts with an evaluable subject. */
  steps = 0;
  subjects = 0;
  responses = 0;
  /** The last recommendations in a row that were equal, this one included; the start is none. */
  repeats = 0;
  /** Reasons to stop, a sum of `STOP` flags. */
  stop = 0;
  /** Whether the signed dose of the cohort at hand was below its recommendation. */
  lowered = false;

  /** Per step: x̃_k (mirrored where the response falls), ȳ_k, m_k. */
  given: Float64Array;
  proportion: Float64Array;
  size: Float64Array;
  /** x_1 … x_{K+1}, real working values after steps 2 and 3. */
  iterates: Float64Array;

  /** All evaluable subjects by dose really given (real working value), lowest first. */
  groups = 0;
  groupX: Float64Array;
  groupN: Float64Array;
  groupY: Float64Array;

  /** Evaluable subjects and responses by level, a dose off the levels counted at the nearest. Empty for a range. */
  readonly levelN: Float64Array;
  readonly levelY: Float64Array;

  /** The cohort at hand, by dose really given, lowest first. */
  cohortDoses = 0;
  cohortX: Float64Array;
  cohortN: Float64Array;
  cohortY: Float64Array;

  /** Numbers a rule remembers by step, kept from trial to trial (see {@link remembered}). */
  private memory = new Float64Array(0);

  /** Buffers of the logit fit, made by the rule that needs them. */
  regression: BinaryRegression | null = null;

  /** @param steps most cohorts. @param levels number of levels, 0 for a range. @param groups most distinct doses given. */
  constructor(steps: number, levels: number, groups: number) {
    this.given = new Float64Array(steps);
    this.proportion = new Float64Array(steps);
    this.size = new Float64Array(steps);
    this.iterates = new Float64Array(steps + 1);
    this.groupX = new Float64Array(groups);
    this.groupN = new Float64Array(groups);
    this.groupY = new Float64Array(groups);
    this.levelN = new Float64Array(levels);
    this.levelY = new Float64Array(levels);
    this.cohortX = new Float64Array(8);
    this.cohortN = new Float64Array(8);
    this.cohortY = new Float64Array(8);
  }

  /** Forgets everything, so that the next trial starts afresh in the same buffers. */
  clear(): void {
    this.rule.fill(0);
    this.guard.fill(0);
    this.place.fill(-1);
    this.levelN.fill(0);
    this.levelY.fill(0);
    this.cohorts = this.steps = this.subjects = this.responses = 0;
    this.repeats = this.stop = this.groups = this.cohortDoses = 0;
    this.lowered = false;
  }

  /** Copies everything that changes from another state of the same design (for looking ahead). */
  copyFrom(other: TrialState): void {
    this.rule.set(other.rule);
    this.guard.set(other.guard);
    this.place.set(other.place);
    this.levelN.set(other.levelN);
    this.levelY.set(other.levelY);
    this.cohorts = other.cohorts;
    this.steps = other.steps;
    this.subjects = other.subjects;
    this.responses = other.responses;
    this.repeats = other.repeats;
    this.stop = other.stop;
    this.lowered = other.lowered;
    this.reserve(other.steps, other.groups);
    for (let i = 0; i < other.steps; i += 1) {
      this.given[i] = other.given[i] as number;
      this.proportion[i] = other.proportion[i] as number;
      this.size[i] = other.size[i] as number;
      this.iterates[i] = other.iterates[i] as number;
    }
    this.iterates[other.steps] = other.iterates[other.steps] as number;
    this.groups = other.groups;
    for (let i = 0; i < other.groups; i += 1) {
      this.groupX[i] = other.groupX[i] as number;
      this.groupN[i] = other.groupN[i] as number;
      this.groupY[i] = other.groupY[i] as number;
    }
    this.cohortDoses = 0;
  }

  /** Makes room for at least so many steps and distinct doses; allocates only when there is not enough. */
  reserve(steps: number, groups: number): void {
    if (steps > this.given.length) {
      this.given = grown(this.given, steps);
      this.proportion = grown(this.proportion, steps);
      this.size = grown(this.size, steps);
      this.iterates = grown(this.iterates, steps + 1);
    }
    if (groups > this.groupX.length) {
      this.groupX = grown(this.groupX, groups);
      this.groupN = grown(this.groupN, groups);
      this.groupY = grown(this.groupY, groups);
    }
  }

  /** Begins a cohort: no evaluable subject yet. */
  beginCohort(): void {
    this.cohortDoses = 0;
  }

  /** Adds `n` evaluable subjects of the cohort at hand, given working dose x, `y` of them with a response. */
  addSubjects(x: number, n: number, y: number): void {
    if (this.cohortDoses === this.cohortX.length) {
      this.cohortX = grown(this.cohortX, this.cohortDoses + 1);
      this.cohortN = grown(this.cohortN, this.cohortDoses + 1);
      this.cohortY = grown(this.cohortY, this.cohortDoses + 1);
    }
    ENTRY[0] = x;
    ENTRY[1] = n;
    ENTRY[2] = y;
    this.cohortDoses = insert(this.cohortX, this.cohortN, this.cohortY, this.cohortDoses);
  }

  /** The same for subjects given `workings[index]`, a dose of the design. */
  addSubjectsAt(workings: Float64Array, index: number, n: number, y: number): void {
    this.addSubjects(workings[index] as number, n, y);
  }

  /** Enters the cohort at hand into the counts by dose; returns its number of evaluable subjects. */
  closeCohort(sign: 1 | -1): number {
    let m = 0;
    let y = 0;
    const first = this.cohortX[0] as number;
    let shift = 0;
    this.reserve(this.steps + 1, this.groups + this.cohortDoses);
    for (let i = 0; i < this.cohortDoses; i += 1) {
      const x = this.cohortX[i] as number;
      const n = this.cohortN[i] as number;
      m += n;
      y += this.cohortY[i] as number;
      // measured from the lowest dose, so that the mean of equal doses is that dose exactly
      shift += n * (x - first);
      ENTRY[0] = x;
      ENTRY[1] = n;
      ENTRY[2] = this.cohortY[i] as number;
      this.groups = insert(this.groupX, this.groupN, this.groupY, this.groups);
    }
    this.cohorts += 1;
    if (m === 0) return 0;
    const mean = first + shift / m;
    this.guard[GUARD.GIVEN] = mean;
    this.given[this.steps] = sign * mean;
    this.proportion[this.steps] = y / m;
    this.size[this.steps] = m;
    this.steps += 1;
    this.subjects += m;
    this.responses += y;
    return m;
  }

  /** Room for `width` numbers a step, zero at first and kept until this state is let go; for results that no outcome enters. */
  remembered(width: number): Float64Array {
    const needed = width * this.given.length;
    if (this.memory.length < needed) this.memory = grown(this.memory, needed);
    return this.memory;
  }

  /** The logit buffers, with room for all distinct doses. */
  logit(): BinaryRegression {
    if (this.regression === null || this.regression.x.length < this.groups) {
      this.regression = new BinaryRegression('logit', this.groupX.length);
    }
    return this.regression;
  }
}

function grown(array: Float64Array, size: number): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(Math.max(size, 2 * array.length));
  larger.set(array);
  return larger;
}

/** What {@link insert} adds: x, n, y. It takes them from here because doubles handed to a function may be boxed. */
const ENTRY = new Float64Array(3);

/** Adds the counts of {@link ENTRY} to rows sorted by x; returns the number of rows. */
function insert(xs: Float64Array, ns: Float64Array, ys: Float64Array, count: number): number {
  const x = ENTRY[0] as number;
  let at = count;
  while (at > 0 && (xs[at - 1] as number) > x) at -= 1;
  if (at > 0 && xs[at - 1] === x) {
    ns[at - 1] = (ns[at - 1] as number) + (ENTRY[1] as number);
    ys[at - 1] = (ys[at - 1] as number) + (ENTRY[2] as number);
    return count;
  }
  for (let i = count; i > at; i -= 1) {
    xs[i] = xs[i - 1] as number;
    ns[i] = ns[i - 1] as number;
    ys[i] = ys[i - 1] as number;
  }
  xs[at] = x;
  ns[at] = ENTRY[1] as number;
  ys[at] = ENTRY[2] as number;
  return count + 1;
}
