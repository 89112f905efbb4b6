/** A refusal of an act: nothing was recorded, and what was typed is to be kept by the form. */
export interface ActionRefusal {
  ok: false;
  /** The name of the refusal, such as `window-not-ended`; stable, for tests and clients. */
  code: string;
  /** What is wrong, what holds, and what to do; shown as it is. */
  message: string;
  /** One sentence per refused field, keyed by its path in the form (`doses.levels.2`). */
  fields?: Record<string, string>;
  /** The number under which an unexpected error stands in the log. */
  reference?: string;
}

/** What a server action gives back: a small value, or a refusal that a person can act on. */
export type ActionResult<T = void> = { ok: true; value: T } | ActionRefusal;

/** A key made once per form instance: the same key posted twice records once. */
export interface Submission {
  submissionKey: string;
}
