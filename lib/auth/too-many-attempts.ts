import { RefusedError } from '@/lib/errors';
import { waitInWords } from './back-off';

/** An attempt made before its time: nothing was checked, and the sentence says when the next one counts. */
export class TooManyAttemptsError extends RefusedError {
  /** Milliseconds since 1970. */
  readonly retryAt: number;

  constructor(retryAt: number, now: number) {
    super({
      code: 'too-many-attempts',
      message: `There were too many wrong passwords. Try again in ${waitInWords(retryAt - now)}; the account is not locked.`,
    });
    this.name = 'TooManyAttemptsError';
    this.retryAt = retryAt;
  }
}
