import type { Dose } from '@/lib/schemas/dose';

/** How a number of a trace is printed. */
export type NumberForm =
  /** A setting or count, as it is. */
  | 'exact'
  /** A computed value on the working scale or without unit. */
  | 'computed'
  /** The same with its sign always shown. */
  | 'signed'
  /** A probability. */
  | 'probability'
  /** A posterior probability, finer so that it does not round onto its cutoff. */
  | 'posterior'
  /** An exact dose in the trial's unit (decimal text). */
  | 'dose'
  /** A computed dose in the trial's unit. */
  | 'dose-computed';

/** One number of a line: its value at full precision, its symbol in METHODS where it has one, how it is printed. */
export interface TraceNumber {
  readonly value: number | Dose;
  readonly form: NumberForm;
  readonly symbol?: string;
}

/** What a line shows at its end: a number, or a word of `RESULT_WORDS`. */
export type TraceResult = TraceNumber | { readonly word: ResultWord };

export type ResultWord =
  'not-reached' | 'inside' | 'kept' | 'none' | 'go-on' | 'stop' | 'off' | 'enough' | 'not-judged';

/** The key of a line's label; the words stand in `words.ts`. */
export type LineId =
  | 'observed'
  | 'given'
  | 'difference'
  | 'difference-expected'
  | 'start'
  | 'gain'
  | 'probit-gain'
  | 'expected'
  | 'prior-variance'
  | 'kesten-index'
  | 'unbounded'
  | 'means'
  | 'slope'
  | 'fit'
  | 'next'
  | 'as-dose'
  | 'stands'
  | 'largest-rise'
  | 'projection'
  | 'nearest'
  | 'no-skipping'
  | 'coherence'
  | 'evaluable'
  | 'closed'
  | 'stopping'
  | 'repeated'
  | 'precision'
  | 'starting-dose';

/** Why a line changed what came before, with the numbers of the reason. */
export interface TraceReason {
  readonly code: ReasonCode;
  readonly numbers: Readonly<Record<string, TraceNumber>>;
}

export type ReasonCode =
  | 'lowered-release'
  | 'largest-rise-bounds-value'
  | 'largest-rise-bounds-dose'
  | 'projected-up'
  | 'projected-down'
  | 'rounded'
  | 'tie-lower'
  | 'tie-higher'
  | 'beyond-ends'
  | 'skips-level'
  | 'response-at-or-above-target'
  | 'response-below-target'
  | 'too-few-evaluable'
  | 'closed'
  | 'all-closed'
  | 'slope-truncated'
  | 'slope-not-defined'
  | 'firth-fit'
  | 'no-fit'
  | 'move-limited'
  | 'carry-bounded'
  | 'no-evaluable-subject'
  | StopReason;

/** The reasons to stop, in the order METHODS names them. */
export type StopReason = 'closed-all' | 'maximum-cohorts' | 'maximum-subjects' | 'repeated' | 'precision';

/**
 * One line of the way from data to dose. It is data: page, letter and report turn it into text with
 * `trace/segments.ts`. A line stands for every step, also where nothing changed.
 */
export interface TraceLine {
  readonly id: LineId;
  /** Step of METHODS: 0 the data, 1 the rule, 2 to 8 guardrails and stopping. */
  readonly step: 0 | 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8;
  /** Symbol of the result with its index, such as a and 5. */
  readonly symbol?: { readonly name: string; readonly index?: number };
  /**
   * Template of the formula: `{name}` prints a number of `numbers`, `^{name}` and `_{name}` print it raised or
   * lowered, `^[text]` and `_[text]` raise or lower a text, `{unit}` prints the trial's unit; all else stands as it is.
   */
  readonly formula: string;
  readonly numbers: Readonly<Record<string, TraceNumber>>;
  readonly result: TraceResult;
  /** Published source of the formula, where the step has one. */
  readonly source?: string;
  /** Whether the step changed the value or the dose it was handed. */
  readonly acted: boolean;
  /** The value or dose before and after the step, where it has both. */
  readonly before?: TraceNumber;
  readonly after?: TraceNumber;
  readonly reason?: TraceReason;
}

/** A number as it is: a setting or a count. */
export function exact(value: number, symbol?: string): TraceNumber {
  return numberOf(value, 'exact', symbol);
}
/** A computed number. */
export function computed(value: number, symbol?: string): TraceNumber {
  return numberOf(value, 'computed', symbol);
}
/** A computed number whose sign matters. */
export function signed(value: number, symbol?: string): TraceNumber {
  return numberOf(value, 'signed', symbol);
}
/** A probability. */
export function probability(value: number, symbol?: string): TraceNumber {
  return numberOf(value, 'probability', symbol);
}
/** A posterior probability. */
export function posterior(value: number): TraceNumber {
  return numberOf(value, 'posterior', undefined);
}
/** An exact dose. */
export function exactDose(value: Dose, symbol?: string): TraceNumber {
  return numberOf(value, 'dose', symbol);
}
/** A computed dose. */
export function computedDose(value: number, symbol?: string): TraceNumber {
  return numberOf(value, 'dose-computed', symbol);
}

function numberOf(value: number | Dose, form: NumberForm, symbol: string | undefined): TraceNumber {
  return symbol === undefined ? { value, form } : { value, form, symbol };
}
