import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { databasePlaces, findRunningDatabase, startDatabase, testServerStatements } from './mariadb.mjs';
import { identify, isRunning, readJson, stopProcess, writeJson } from './processes.mjs';

/** Nothing of a test must survive a power cut: the whole server is thrown away. */
const FAST = [
  '--innodb-flush-log-at-trx-commit=0',
  '--innodb-doublewrite=0',
  '--innodb-buffer-pool-size=64M',
  '--innodb-log-file-size=32M',
  '--lock-wait-timeout=60',
];

/** Removes the servers of test runs that were killed: their owner is gone. */
async function sweep(dataFolder) {
  if (!existsSync(dataFolder)) return;
  for (const name of readdirSync(dataFolder)) {
    if (!name.startsWith('test-')) continue;
    const folder = path.join(dataFolder, name);
    const owner = readJson(path.join(folder, 'owner.json'));
    if (owner && isRunning(owner)) continue;
    const running = findRunningDatabase(databasePlaces(folder));
    if (running) await stopProcess(running, { graceMs: 2_000 });
    rmSync(folder, { recursive: true, force: true });
  }
}

/**
 * Starts an empty MariaDB of its own, on a free port, in a folder of its own; gone after `stop`, and at the latest
 * when this process exits.
 * @param root the project's folder
 * @param options.statements makes from the password the statements that make its accounts; those of tests unless told
 * @param options.settings options of the server; unless told those that make tests fast, and a power cut deadly
 * @returns its port, the password of its accounts (in tests stepwell_test_admin, who may do everything, and stepwell_test_app), and `stop`
 */
export async function startThrowAwayDatabase(
  root,
  { statements = testServerStatements, settings = FAST } = {},
) {
  const dataFolder = path.join(root, '.data');
  await sweep(dataFolder);
  const folder = path.join(dataFolder, `test-${process.pid}-${randomBytes(3).toString('hex')}`);
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  writeJson(path.join(folder, 'owner.json'), identify(process.pid));
  const password = randomBytes(24).toString('base64url');
  const remove = () => rmSync(folder, { recursive: true, force: true });
  let started;
  try {
    started = await startDatabase(databasePlaces(folder), {
      statements: statements(password),
      settings,
    });
  } catch (error) {
    remove();
    throw error;
  }
  const { child, port } = started;
  const identity = identify(child.pid);
  const atExit = () => {
    child.kill('SIGKILL');
    remove();
  };
  process.once('exit', atExit);
  return {
    port,
    password,
    pid: child.pid,
    stop: async () => {
      process.off('exit', atExit);
      await stopProcess(identity, { graceMs: 10_000 });
      remove();
    },
  };
}
