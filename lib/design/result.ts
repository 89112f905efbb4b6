/** A value, or the typed reason why there is none. */
export type Result<T, E> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly error: E };

export function success<T>(value: T): { readonly ok: true; readonly value: T } {
  return { ok: true, value };
}

export function failure<E>(error: E): { readonly ok: false; readonly error: E } {
  return { ok: false, error };
}

/** Where a computation stood when it failed: plain numbers by name, not finite ones as text. */
export type FailureState = Readonly<Record<string, number | string>>;

/**
 * Why the mathematics gives no recommendation.
 * - `history`: the data do not fit the design; `path` names the place in the history.
 * - `overflow`, `not-a-number`: a computed value left the range of doubles, at the state shown.
 * - `not-converged`: an iterative fit did not settle, at the state shown.
 */
export type DesignFailure =
  | {
      readonly code: 'history';
      readonly message: string;
      readonly path: readonly (string | number)[];
    }
  | {
      readonly code: 'overflow' | 'not-a-number' | 'not-converged';
      readonly message: string;
      readonly cohort: number;
      readonly state: FailureState;
    };
