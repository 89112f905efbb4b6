import { models } from '@/lib/db/connection';
import { RefusedError } from '@/lib/errors';

/**
 * The stored result of a submission already applied, or null when its key is new. Asked under the lock of the row the
 * command is about, so that the same form posted twice at once is applied once.
 */
export async function submissionResult(
  personId: string,
  submissionKey: string,
  command: string,
): Promise<unknown> {
  const stored = await models().Submission.findOne({ where: { personId, submissionKey } });
  if (stored === null) return null;
  if (stored.command !== command) {
    throw new RefusedError({
      code: 'conflict',
      message: 'This form was sent already for something else. Load the page again.',
    });
  }
  return JSON.parse(stored.result) as unknown;
}

/** Keeps the result of a submission, in the transaction that applied it. */
export async function storeSubmission(
  personId: string,
  submissionKey: string,
  command: string,
  result: object,
  at: string,
): Promise<void> {
  await models().Submission.create({
    personId,
    submissionKey,
    command,
    result: JSON.stringify(result),
    createdAt: new Date(at),
  });
}
