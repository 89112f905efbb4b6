import type { TestProject } from 'vitest/node';
import { startThrowAwayDatabase } from '../../scripts/support/throw-away-database.mjs';
import { ROOT } from './vitest-shared';

/** Where the throw-away MariaDB of this run listens, and the password of its two test accounts. */
export interface DatabaseServer {
  readonly port: number;
  readonly password: string;
  readonly pid: number;
}

declare module 'vitest' {
  export interface ProvidedContext {
    databaseServer: DatabaseServer;
  }
}

/** Starts the run's throw-away MariaDB, or uses the one that the test script started for all of its runs. */
export async function startDatabaseServer(): Promise<{ server: DatabaseServer; stop: () => Promise<void> }> {
  const shared = process.env.STEPWELL_TEST_DATABASE;
  if (shared) return { server: JSON.parse(shared) as DatabaseServer, stop: () => Promise.resolve() };
  const started = await startThrowAwayDatabase(ROOT);
  const { port, password, pid } = started;
  return { server: { port, password, pid }, stop: () => started.stop() };
}

export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const { server, stop } = await startDatabaseServer();
  project.provide('databaseServer', server);
  return stop;
}
