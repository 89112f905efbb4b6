import 'server-only';
import { z } from 'zod';
import { RefusedError } from '@/lib/errors';
import { environment } from '@/lib/env';
import { roleMay, type TrialPermission } from '@/lib/policy/trial-permissions';
import { SIGNED_OUT } from './answering';
import { hidden } from './hidden';
import { problemOf } from './problem';
import { refusedInput } from './refused-input';
import { currentReader, membershipByCode, peekReader, type Reader, type ReaderMembership } from './session';

/** The largest body a route reads, in bytes; `proxy.ts` refuses larger ones before. */
const LARGEST_BODY_BYTES = 1_048_576;

/** What a route file exports for a method. */
export type RouteHandler = (
  request: Request,
  context: { params: Promise<Record<string, string>> },
) => Promise<Response>;

const none = z.undefined();
type None = typeof none;

interface Schemas<Query extends z.ZodType, Body extends z.ZodType, Answer extends z.ZodType> {
  /** The query string, each name to its text; unknown names are refused by a strict schema. */
  readonly query?: Query;
  /** The JSON body, for methods that have one. */
  readonly body?: Body;
  /** What the answer holds: anything beside it is a fault and is not sent. */
  readonly response: Answer;
}

interface Asked<Query extends z.ZodType, Body extends z.ZodType> {
  readonly request: Request;
  readonly params: Readonly<Record<string, string>>;
  readonly reader: Reader;
  readonly query: z.output<Query>;
  readonly body: z.output<Body>;
}

interface ReaderRouteOptions<
  Query extends z.ZodType,
  Body extends z.ZodType,
  Answer extends z.ZodType,
> extends Schemas<Query, Body, Answer> {
  /** Whether this reader may ask at all; `'own-account'` for what is about the reader alone. */
  readonly permits: 'own-account' | ((reader: Reader) => boolean);
  readonly handle: (asked: Asked<Query, Body>) => Promise<z.input<Answer>>;
}

/**
 * Makes a route for a signed-in person: origin, reader, permission, schemas, work, answer as JSON. GET leaves the idle
 * time of the session alone, so that polling does not keep it alive.
 */
export function readerRoute<
  Answer extends z.ZodType,
  Query extends z.ZodType = None,
  Body extends z.ZodType = None,
>({ query, body, response, permits, handle }: ReaderRouteOptions<Query, Body, Answer>): RouteHandler {
  return (request, context) =>
    answered(request, async (seen) => {
      const reader = await routeReader(request);
      seen(reader);
      if (permits !== 'own-account' && !permits(reader)) throw hidden();
      const asked = await parseRequest(request, query, body);
      const answer = await handle({ request, params: await context.params, reader, ...asked });
      return response.parse(answer);
    });
}

interface TrialRouteOptions<
  Query extends z.ZodType,
  Body extends z.ZodType,
  Answer extends z.ZodType,
> extends Schemas<Query, Body, Answer> {
  readonly permission: TrialPermission;
  readonly handle: (
    asked: Asked<Query, Body> & { readonly membership: ReaderMembership },
  ) => Promise<z.input<Answer>>;
}

/**
 * Makes a route below `/api/trials/[code]`: as `readerRoute`, for members of the trial whose role carries the
 * permission. A trial of others, and one that does not exist, answer alike.
 */
export function trialRoute<
  Answer extends z.ZodType,
  Query extends z.ZodType = None,
  Body extends z.ZodType = None,
>({ query, body, response, permission, handle }: TrialRouteOptions<Query, Body, Answer>): RouteHandler {
  return (request, context) =>
    answered(request, async (seen) => {
      const reader = await routeReader(request);
      seen(reader);
      const params = await context.params;
      const membership = membershipByCode(reader, params.code ?? '');
      if (membership === null) throw hidden();
      if (!roleMay(membership.role, permission)) throw hidden();
      const asked = await parseRequest(request, query, body);
      return response.parse(await handle({ request, params, reader, membership, ...asked }));
    });
}

/** Runs the work of a route and answers with its value as JSON, or with the details of the problem. */
export async function answered(
  request: Request,
  work: (seen: (reader: Reader) => void) => Promise<unknown>,
): Promise<Response> {
  let personId: string | null = null;
  try {
    const value = await work((reader) => {
      personId = reader.personId;
    });
    return new Response(JSON.stringify(value), {
      headers: { 'content-type': 'application/json', 'cache-control': 'no-store' },
    });
  } catch (error) {
    return problemOf(request, error, personId);
  }
}

/** The signed-in reader of a route; refuses a change that another site's page asks for, and a visitor. */
export async function routeReader(request: Request): Promise<Reader> {
  const reads = request.method === 'GET' || request.method === 'HEAD';
  if (!reads && !comesFromHere(request)) {
    throw new RefusedError({
      code: 'forbidden',
      message: 'This was asked for from another site’s page, so nothing was done.',
    });
  }
  const reader = reads ? await peekReader() : await currentReader();
  if (reader === null) throw new RefusedError(SIGNED_OUT);
  return reader;
}

/** Whether the page that asks is of this installation: browsers name its origin with every change. */
export function comesFromHere(request: Request): boolean {
  const origin = request.headers.get('origin');
  if (origin === null || !URL.canParse(origin)) return false;
  const host = request.headers.get('x-forwarded-host') ?? request.headers.get('host');
  return origin === new URL(environment().url).origin || new URL(origin).host === host;
}

async function parseRequest<Query extends z.ZodType, Body extends z.ZodType>(
  request: Request,
  query: Query | undefined,
  body: Body | undefined,
): Promise<{ query: z.output<Query>; body: z.output<Body> }> {
  const search = Object.fromEntries(new URL(request.url).searchParams);
  return {
    query: parsed(query ?? none, query ? search : undefined) as z.output<Query>,
    body: parsed(body ?? none, body ? await jsonOf(request) : undefined) as z.output<Body>,
  };
}

function parsed<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> {
  const result = schema.safeParse(value);
  if (!result.success) throw new RefusedError(refusedInput(result.error));
  return result.data;
}

/** The JSON a request carries. Refuses what is over-large, and what is no JSON. */
export async function jsonOf(request: Request): Promise<unknown> {
  const text = await request.text();
  if (new TextEncoder().encode(text).length > LARGEST_BODY_BYTES) {
    throw new RefusedError({
      code: 'too-large',
      message: `The request holds more than ${LARGEST_BODY_BYTES} bytes. Nothing was recorded.`,
    });
  }
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new RefusedError({ code: 'invalid', message: 'The body is not JSON. Nothing was recorded.' });
  }
}
