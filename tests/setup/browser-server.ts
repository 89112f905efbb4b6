import { randomBytes } from 'node:crypto';
import type { TestProject } from 'vitest/node';
import { startWeb, startWorker } from '../../scripts/support/application.mjs';
import { ensureBuild } from '../../scripts/support/build.mjs';
import { freePort } from '../../scripts/support/ports.mjs';
import { identify, stopProcess } from '../../scripts/support/processes.mjs';
import { startDatabaseServer } from './database-server';
import { makeDatabase, type MadeDatabase } from './make-database';
import { ROOT } from './vitest-shared';

/** The installation that browser tests use: an empty one of kind 'test', with its worker and its mail catcher. */
export interface BrowserServer {
  /** The address without a slash at its end. */
  readonly url: string;
  readonly database: MadeDatabase;
}

declare module 'vitest' {
  export interface ProvidedContext {
    browserServer: BrowserServer;
  }
}

/** Builds when needed, then starts web server and worker over a fresh database, once for all journeys. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  await ensureBuild(ROOT, { say: (text) => console.log(text) });
  const { server, stop } = await startDatabaseServer();
  const database = await makeDatabase(server);
  const port = String(await freePort());
  const url = `http://localhost:${port}`;
  const env = {
    ...process.env,
    DATABASE_URL: database.url,
    PORT: port,
    STEPWELL_URL: url,
    NEXTAUTH_URL: url,
    NEXTAUTH_SECRET: randomBytes(32).toString('base64url'),
    STEPWELL_LOG_LEVEL: process.env.STEPWELL_LOG_LEVEL ?? 'warn',
  };
  const parts = await Promise.all([startWorker(ROOT, env), startWeb(ROOT, env)]);
  project.provide('browserServer', { url, database });
  return async () => {
    for (const { pid } of parts) {
      const identity = pid === undefined ? null : identify(pid);
      if (identity) await stopProcess(identity, { graceMs: 5_000, wholeGroup: true });
    }
    await stop();
  };
}
