import type * as mariadb from 'mariadb';
import { afterAll, inject } from 'vitest';
import { closeDatabase, openDatabaseAt } from '@/lib/db/connection';
import { asOwner, makeDatabase, type MadeDatabase } from './make-database';

export interface TestDatabase extends MadeDatabase {
  /** Runs work as the owner of the schema. */
  readonly asOwner: <T>(work: (owner: mariadb.Connection) => Promise<T>) => Promise<T>;
}

/**
 * A fresh, migrated database of kind 'test' for this test file. It becomes the database of the process, so that
 * commands and queries work on it as they do in the application, with the application user's rights. Call it once,
 * in a `beforeAll`.
 * @param options.poolSize connections for parallel transactions, default 20
 */
export async function createTestDatabase(options: { poolSize?: number } = {}): Promise<TestDatabase> {
  const made = await makeDatabase(inject('databaseServer'));
  process.env.DATABASE_URL = made.url;
  openDatabaseAt(made.url, options.poolSize ?? 20);
  return { ...made, asOwner: (work) => asOwner(made, work) };
}

afterAll(closeDatabase);
