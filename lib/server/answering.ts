import 'server-only';
import { unstable_rethrow } from 'next/navigation';
import { z } from 'zod';
import { RefusedError, type Refusal } from '@/lib/errors';
import { log } from '@/lib/log';
import type { ActionResult } from '@/lib/schemas/action-result';
import { submissionKeySchema } from '@/lib/schemas/submission';
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
