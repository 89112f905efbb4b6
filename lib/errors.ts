/** The kinds of refusal, each with the HTTP status a route answers with (RFC 9110, RFC 9457). */
export const REFUSAL_STATUS = {
  'signed-out': 401,
  'wrong-credentials': 401,
  forbidden: 403,
  'not-found': 404,
  conflict: 409,
  'too-large': 413,
  invalid: 422,
  refused: 422,
  'too-many-attempts': 429,
} as const;

export type RefusalCode = keyof typeof REFUSAL_STATUS;

/** Why something was not done, in a sentence a person can act on, with the fields concerned. */
export interface Refusal {
  readonly code: RefusalCode;
  readonly message: string;
  readonly fields?: Readonly<Record<string, string>>;
}

/** An expected refusal on its way to the person who asked. Only these show their text. */
export class RefusedError extends Error {
  readonly code: RefusalCode;
  readonly fields: Readonly<Record<string, string>> | undefined;

  constructor(refusal: Refusal) {
    super(refusal.message);
    this.name = 'RefusedError';
    this.code = refusal.code;
    this.fields = refusal.fields;
  }

  get refusal(): Refusal {
    return { code: this.code, message: this.message, ...(this.fields ? { fields: this.fields } : {}) };
  }
}

/** What is answered for a record that does not exist or is not the reader's: the two look alike. */
export function notFound(what = 'This'): RefusedError {
  return new RefusedError({
    code: 'not-found',
    message: `${what} does not exist, or you have no access to it.`,
  });
}
