import 'server-only';
import { proveIdentity } from '@/lib/commands/prove-identity';
import {
  runTrialCommand,
  type TrialCommandRequest,
  type TrialCommandResult,
} from '@/lib/commands/run-trial-command';
import { RefusedError } from '@/lib/errors';
import { trialFormSchemas } from '@/lib/schemas/trial-forms';
import type { TrialCommandType } from '@/lib/schemas/trial-inputs';
import { parseSubmission } from './answering';
import { clientAddress } from './client-address';
import type { Reader } from './session';

/** A parsed form of a trial, taken apart. */
interface TrialForm {
  readonly submissionKey: string;
  readonly trialCode: string;
  readonly credentials: { readonly email: string; readonly password: string } | null;
  readonly command: TrialCommandRequest['command'];
}

/** Parses a form of a trial by its schema and takes it apart: code, credentials, command. */
export function parseTrialForm(type: TrialCommandType, input: unknown): TrialForm {
  const { submissionKey, value } = parseSubmission(trialFormSchemas[type], input);
  const { trialCode, email, password, ...rest } = value as {
    trialCode: string;
    email?: string;
    password?: string;
  };
  return {
    submissionKey,
    trialCode,
    credentials: email === undefined || password === undefined ? null : { email, password },
    command: { type, input: rest } as TrialCommandRequest['command'],
  };
}

/**
 * Runs one command of a trial for a reader: proves address and password again where it is a signature, before the
 * transaction, then runs the command, which authorises against the loaded trial.
 * @throws RefusedError with the sentence to show
 */
export async function performTrialForm(
  reader: Reader,
  { submissionKey, trialCode, credentials, command }: TrialForm,
): Promise<TrialCommandResult> {
  const identity =
    credentials === null
      ? undefined
      : await proveIdentity({
          ...credentials,
          purpose: 'signature',
          clientAddress: await clientAddress(),
          expectedPersonId: reader.personId,
        }).catch((error: unknown) => {
          throw asFieldErrors(error);
        });
  return runTrialCommand({ personId: reader.personId, trialCode, command, submissionKey, identity });
}

/** Shows a refused signature at the password, which the form has emptied. */
function asFieldErrors(error: unknown): unknown {
  if (!(error instanceof RefusedError) || error.code !== 'wrong-credentials') return error;
  return new RefusedError({
    ...error.refusal,
    fields: { password: 'Enter your address and your password again.' },
  });
}
