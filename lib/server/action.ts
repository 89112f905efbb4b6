import 'server-only';
import type { z } from 'zod';
import type { TrialCommandResult } from '@/lib/commands/run-trial-command';
import { mayInInstallation, type InstallationPermission } from '@/lib/policy/installation-permissions';
import type { ActionResult } from '@/lib/schemas/action-result';
import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import type { TrialCommandType } from '@/lib/schemas/trial-inputs';
import { type Action, type ActionContext, actionReader, answering, parseSubmission } from './answering';
import { clientAddress } from './client-address';
import { hidden } from './hidden';
import type { Reader } from './session';
import { parseTrialForm, performTrialForm } from './trial-form';

export type { Action, ActionContext };

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
          throw hidden();
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

/**
 * Runs one form of a trial: authenticate, parse, prove the identity for a signature, run the command. Each action of a
 * trial is one line around it in an `actions.ts` with 'use server'. What the input holds is not trusted.
 */
export async function runTrialAction<Type extends TrialCommandType>(
  type: Type,
  input: TrialFormInput<Type>,
): Promise<ActionResult<TrialCommandResult>> {
  let personId: string | null = null;
  return answering(
    type,
    () => personId,
    async () => {
      const reader = await actionReader();
      personId = reader.personId;
      return performTrialForm(reader, parseTrialForm(type, input));
    },
  );
}
