import type { Transaction } from 'sequelize';
import { log } from '../log';
import { database } from './connection';
import { isConflict, isLostConnection } from './transient-errors';

export interface TransactionOptions {
  /** How often the work is run before its error is thrown; default 8. */
  readonly attempts?: number;
  /**
   * Whether the work may be run again when the connection was lost while its commit was on the way, so that
   * nobody knows whether it was kept. True for work that recognises its own earlier success (a command with a
   * submission key, an update that matches once); default false.
   */
  readonly repeatable?: boolean;
}

/** The connection was lost during the commit: whether the change was kept is not known. */
export class OutcomeUnknownError extends Error {
  constructor(cause: unknown) {
    super('The connection to the database was lost while the change was being saved.', { cause });
    this.name = 'OutcomeUnknownError';
  }
}

const CONFLICT_PAUSE_MS = 15;
const LOST_PAUSE_MS = 200;
const LONGEST_PAUSE_MS = 3_000;

/** Full jitter: any time between nothing and the doubled step, so that rivals do not meet again. */
function pause(attempt: number, stepMs: number): Promise<void> {
  const longest = Math.min(LONGEST_PAUSE_MS, stepMs * 2 ** attempt);
  return new Promise((resolve) => setTimeout(resolve, Math.random() * longest));
}

/**
 * Runs work in one READ COMMITTED transaction, and the whole work again after a conflict (1213, 1205) or a
 * lost connection, with a jittered pause that grows. Every statement inside joins the transaction, with or
 * without `{ transaction }`. Do nothing in it that cannot be done twice: no mail, no password hashing, no file.
 * What shall happen after the commit goes after the `await` of this call.
 * @param work gets the transaction; what it returns is returned after the commit
 * @returns what the work returned
 * @throws what the work throws (after a roll-back); OutcomeUnknownError when the commit's fate is unknown
 */
export async function inTransaction<T>(
  work: (transaction: Transaction) => Promise<T>,
  options: TransactionOptions = {},
): Promise<T> {
  const { sequelize, transactionAtWork } = database();
  if (transactionAtWork.getStore()) throw new Error('inTransaction was called inside a transaction.');
  const attempts = options.attempts ?? 8;

  for (let attempt = 1; ; attempt += 1) {
    let isCommitting = false;
    try {
      const transaction = await sequelize.transaction();
      try {
        const result = await transactionAtWork.run(transaction, () => work(transaction));
        isCommitting = true;
        await transaction.commit();
        return result;
      } catch (error) {
        if (!isCommitting) await rollBack(transaction);
        throw error;
      }
    } catch (error) {
      const isLost = isLostConnection(error);
      if (isLost && isCommitting && !options.repeatable) throw new OutcomeUnknownError(error);
      if (attempt >= attempts || !(isLost || isConflict(error))) throw error;
      log().debug({ error, attempt }, 'transaction is run again');
      await pause(attempt, isLost ? LOST_PAUSE_MS : CONFLICT_PAUSE_MS);
    }
  }
}

/** Rolls back; on a lost connection there is nothing to roll back, and the error of the work is the one to show. */
async function rollBack(transaction: Transaction): Promise<void> {
  try {
    await transaction.rollback();
  } catch (error) {
    log().debug({ error }, 'roll-back failed; the connection is dropped, which rolls back too');
  }
}
