import 'server-only';
import { unstable_rethrow } from 'next/navigation';
import { z } from 'zod';
import { RefusedError, type Refusal } from '@/lib/errors';
import { log } from '@/lib/log';
import { mayInInstallation, type InstallationPermission } from '@/lib/policy/installation-permissions';
import type { ActionResult } from '@/lib/schemas/action-result';
import { submissionKeySchema } from '@/lib/schemas/submission';
import { clientAddress } from './client-address';
import { refusedInput } from './refused-input';
import { currentReader, type Reader } from './session';
import { unexpected } from './unexpected';

/** What is answered to somebody whose session has ended: what they typed stays in the form. */
export const SIGNED_OUT: Refusal = {
  code: 'signed-out',
  message:
    'You are not signed in any more, so nothing was recorded. Sign in in another tab, come back here and send this again: what you typed is still here.',
};

/** What an act knows beside its input. */
export interface ActionContext {
  readonly reader: Reader;
  readonly clientAddress: string;
  /** Made once by the form: the same key sent again is the same act. */
  readonly submissionKey: string;
}

/** What a form's action takes. Its content is not trusted, whatever the type says. */
export type ActionInput<Schema extends z.ZodType> = z.input<Schema> & { submissionKey: string };

export type Action<Schema extends z.ZodType, Value> = (
  input: ActionInput<Schema>,
) => Promise<ActionResult<Value>>;

const submitted = z.looseObject(
  { submissionKey: submissionKeySchema },
  { error: 'The form is empty. Load the page again.' },
);

/**
 * Parses what a form sent: the submission key, and the rest by the form's own schema.
 * @throws RefusedError `invalid`, with the sentence for each refused field by its path
 */
export function parseSubmission<Schema extends z.ZodType>(
  schema: Schema,
  input: unknown,
): { submissionKey: string; value: z.output<Schema> } {
  const outer = submitted.safeParse(input);
  if (!outer.success) throw new RefusedError(refusedInput(outer.error));
  const { submissionKey, ...rest } = outer.data;
  const inner = schema.safeParse(rest);
  if (!inner.success) throw new RefusedError(refusedInput(inner.error));
  return { submissionKey, value: inner.data };
}

/**
 * Runs the work of an action and turns what it throws into an answer: a refusal with its sentence and fields, anything
 * else into a reference under which it is logged.
 */
export async function answering<Value>(
  name: string,
  personId: () => string | null,
  work: () => Promise<Value>,
): Promise<ActionResult<Value>> {
  try {
    return { ok: true, value: await work() };
  } catch (error) {
    unstable_rethrow(error);
    if (error instanceof RefusedError) {
      log().info({ act: name, code: error.code, personId: personId() }, 'refused');
      const { code, message, fields } = error.refusal;
      return { ok: false, code, message, ...(fields ? { fields: { ...fields } } : {}) };
    }
    return { ok: false, ...unexpected(error, { act: name, personId: personId() }) };
  }
}

/** The signed-in reader of an action; refuses when there is none. */
export async function actionReader(): Promise<Reader> {
  const reader = await currentReader();
  if (reader === null) throw new RefusedError(SIGNED_OUT);
  return reader;
}

interface InstallationActionOptions<Schema extends z.ZodType, Value> {
  /** What the act is called in the log. */
  readonly name: string;
  /** The schema of the form, without the submission key. */
  readonly schema: Schema;
  readonly permission: InstallationPermission;
  readonly run: (value: z.output<Schema>, context: ActionContext) => Promise<Value>;
}

/**
 * Makes an action of the administration: authenticate, authorise, parse, run. For everybody without the permission it
 * answers as if it did not exist. Export it from a 'use server' file inside an async function of its own.
 */
export function installationAction<Schema extends z.ZodType, Value>({
  name,
  schema,
  permission,
  run,
}: InstallationActionOptions<Schema, Value>): Action<Schema, Value> {
  return readerAction({
    name,
    schema,
    permits: (reader) => mayInInstallation(reader, permission),
    run,
  });
}

interface ReaderActionOptions<Schema extends z.ZodType, Value> {
  readonly name: string;
  readonly schema: Schema;
  /** Whether this reader may do it at all; `true` only for acts on one's own account. */
  readonly permits: 'own-account' | ((reader: Reader) => boolean);
  readonly run: (value: z.output<Schema>, context: ActionContext) => Promise<Value>;
}

/** Makes an action of a signed-in person that is about no trial: on their own account, or by a predicate. */
export function readerAction<Schema extends z.ZodType, Value>({
  name,
  schema,
  permits,
  run,
}: ReaderActionOptions<Schema, Value>): Action<Schema, Value> {
  return (input) => {
    let personId: string | null = null;
    return answering(
      name,
      () => personId,
      async () => {
        const reader = await actionReader();
        personId = reader.personId;
        if (permits !== 'own-account' && !permits(reader)) {
          throw new RefusedError({
            code: 'not-found',
            message: 'This does not exist, or it is not yours to do.',
          });
        }
        const { submissionKey, value } = parseSubmission(schema, input);
        return run(value, { reader, submissionKey, clientAddress: await clientAddress() });
      },
    );
  };
}

interface PublicActionOptions<Schema extends z.ZodType, Value> {
  readonly name: string;
  readonly schema: Schema;
  readonly run: (value: z.output<Schema>, context: Omit<ActionContext, 'reader'>) => Promise<Value>;
}

/** Makes an action for visitors who are not signed in: accepting a link. What authorises it is in its input. */
export function publicAction<Schema extends z.ZodType, Value>({
  name,
  schema,
  run,
}: PublicActionOptions<Schema, Value>): Action<Schema, Value> {
  return (input) =>
    answering(
      name,
      () => null,
      async () => {
        const { submissionKey, value } = parseSubmission(schema, input);
        return run(value, { submissionKey, clientAddress: await clientAddress() });
      },
    );
}
