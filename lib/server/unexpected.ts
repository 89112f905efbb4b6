import 'server-only';
import { randomBytes } from 'node:crypto';
import { OutcomeUnknownError } from '@/lib/db/transaction';
import { log } from '@/lib/log';

/** What a person is told of an error nobody foresaw, and the reference under which it stands in the log. */
export interface Unexpected {
  readonly code: 'unexpected';
  readonly message: string;
  readonly reference: string;
}

/** Logs an error nobody foresaw under a new reference. Its text goes to the log, never to the browser. */
export function unexpected(error: unknown, context: Readonly<Record<string, string | null>>): Unexpected {
  const reference = randomBytes(5).toString('hex');
  log().error({ error, reference, ...context }, 'unexpected error');
  const message =
    error instanceof OutcomeUnknownError
      ? 'The connection was lost while this was being saved, so it is not known whether it was recorded. Load the page again to see.'
      : 'Something went wrong; nothing was recorded. Try again; if it happens again, tell the administrator the reference.';
  return { code: 'unexpected', message, reference };
}
