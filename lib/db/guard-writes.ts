import type { AsyncLocalStorage } from 'node:async_hooks';
import type { QueryOptions, Sequelize, Transaction } from 'sequelize';

const WRITE =
  /^[\s(]*(insert|update|delete|replace|load|truncate|alter|create|drop|rename|grant|revoke|call)\b/i;

/**
 * Makes every statement of a pool join the transaction at work, and refuses any write outside one: a change
 * without its trail and its mails cannot be made by forgetting an argument. Models and raw queries alike end
 * in `Sequelize.query`, so the guard stands there.
 * @param sequelize the pool to guard
 * @param transactionAtWork the storage `inTransaction` fills
 */
export function guardWrites(sequelize: Sequelize, transactionAtWork: AsyncLocalStorage<Transaction>): void {
  type Statement = string | { query: string; values?: unknown[] };
  const original = sequelize.query.bind(sequelize) as (
    sql: Statement,
    options?: QueryOptions,
  ) => Promise<unknown>;

  const guarded = (sql: Statement, options: QueryOptions = {}): Promise<unknown> => {
    const transaction =
      options.transaction === undefined ? transactionAtWork.getStore() : (options.transaction ?? undefined);
    if (!transaction && WRITE.test(typeof sql === 'string' ? sql : sql.query)) {
      return Promise.reject(new WriteOutsideTransactionError());
    }
    return original(
      sql,
      options.transaction === undefined && transaction ? { ...options, transaction } : options,
    );
  };
  sequelize.query = guarded as Sequelize['query'];
}

/** A fault in the program: a write was attempted outside `inTransaction`. */
export class WriteOutsideTransactionError extends Error {
  constructor() {
    super('A write was attempted outside a transaction. Wrap it in inTransaction (lib/db/transaction.ts).');
    this.name = 'WriteOutsideTransactionError';
  }
}
