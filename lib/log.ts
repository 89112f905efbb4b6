import { pino } from 'pino';
import { environment } from './env';

const GLOBAL_KEY = Symbol.for('stepwell.log');
type Holder = { [GLOBAL_KEY]?: pino.Logger };

/**
 * The process's log: one JSON object a line on standard output. Never log a request's body, a mail's text,
 * a subject's code or an address with a token in it; log ids.
 */
export function log(): pino.Logger {
  const holder = globalThis as Holder;
  holder[GLOBAL_KEY] ??= pino({
    level: environment().logLevel,
    base: { pid: process.pid },
    timestamp: pino.stdTimeFunctions.isoTime,
    redact: ['password', '*.password', 'token', '*.token', 'parameters', '*.parameters', 'sql', '*.sql'],
    serializers: { error: describeError, err: describeError },
  });
  return holder[GLOBAL_KEY];
}

/** What of an error is logged: its class, code, text and stack; never the SQL or the values it carries. */
function describeError(error: unknown): Record<string, unknown> {
  if (!(error instanceof Error)) return { text: String(error) };
  const cause = 'parent' in error && error.parent instanceof Error ? error.parent : undefined;
  const errno = cause && 'errno' in cause ? cause.errno : 'errno' in error ? error.errno : undefined;
  return { name: error.name, text: error.message, errno, stack: error.stack };
}
