import 'server-only';
import { STATUS_CODES } from 'node:http';
import { TooManyAttemptsError } from '@/lib/auth/too-many-attempts';
import { REFUSAL_STATUS, RefusedError } from '@/lib/errors';
import { log } from '@/lib/log';
import { unexpected } from './unexpected';

/** The members of a problem's details (RFC 9457), with this project's own `code`, `fields` and `reference`. */
export interface ProblemDetails {
  readonly type: 'about:blank';
  readonly title: string;
  readonly status: number;
  readonly detail: string;
  /** The path that was asked for. */
  readonly instance: string;
  /** The name of the refusal, stable. */
  readonly code: string;
  /** One sentence for each refused field, by its path. */
  readonly fields?: Readonly<Record<string, string>>;
  readonly reference?: string;
}

/** An answer of problem details that no cache keeps. */
export function problem(
  request: Request,
  status: number,
  details: Pick<ProblemDetails, 'code' | 'detail' | 'fields' | 'reference'>,
  headers: Readonly<Record<string, string>> = {},
): Response {
  const { code, detail, fields, reference } = details;
  const body: ProblemDetails = {
    type: 'about:blank',
    title: STATUS_CODES[status] ?? 'Refused',
    status,
    detail,
    instance: new URL(request.url).pathname,
    code,
    ...(fields ? { fields } : {}),
    ...(reference ? { reference } : {}),
  };
  return new Response(JSON.stringify(body), {
    status,
    headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store', ...headers },
  });
}

/** What a route answers when its work threw: a refusal with its sentence, or a reference to the log. */
export function problemOf(request: Request, error: unknown, personId: string | null): Response {
  const act = `${request.method} ${new URL(request.url).pathname}`;
  if (error instanceof RefusedError) {
    log().info({ act, code: error.code, personId }, 'refused');
    const retry: Record<string, string> =
      error instanceof TooManyAttemptsError
        ? { 'retry-after': String(Math.max(1, Math.ceil((error.retryAt - Date.now()) / 1000))) }
        : {};
    const { code, message, fields } = error.refusal;
    return problem(request, REFUSAL_STATUS[code], { code, detail: message, fields }, retry);
  }
  const { code, message, reference } = unexpected(error, { act, personId });
  return problem(request, 500, { code, detail: message, reference });
}
