/*
 * Starts the whole installation with one command: installs what is missing, starts a private MariaDB, migrates,
 * loads the demo once, builds when needed, serves, runs the worker, and stops all of it in order. Node.js
 * built-ins only: it runs before anything is installed.
 */
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { prepareDatabase, startWeb, startWorker } from './support/application.mjs';
import { ensureBuild } from './support/build.mjs';
import {
  databasePlaces,
  databaseUrl,
  findRunningDatabase,
  installationStatements,
  startDatabase,
} from './support/mariadb.mjs';
import { ensureNodeModules, ensureProgram } from './support/packages.mjs';
import { Part } from './support/parts.mjs';
import { portTrouble } from './support/ports.mjs';
import { identify, releaseLock, stopProcess, takeLock } from './support/processes.mjs';
import { installationSecrets } from './support/secrets.mjs';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..');
const dataFolder = path.join(root, '.data');
const runFolder = path.join(dataFolder, 'run');
const logFolder = path.join(dataFolder, 'log');
const lockFile = path.join(runFolder, 'start.json');
const isDevelopment = process.argv.includes('--dev');

const say = (text) => console.log(text);
/** Commands at work now: an interruption ends them. */
const children = new Set();
/** Parts that run, in the order they were started. */
const parts = [];
let stopping = null;

/** A refusal to start that needs no stack: its sentence says what to do. */
class StartRefused extends Error {}

function chosenPort() {
  const text = process.env.PORT ?? '';
  if (text === '') return 3000;
  const port = Number(text);
  if (!/^\d+$/.test(text) || port < 1 || port > 65535) {
    throw new StartRefused(`PORT is “${text}”, but a port is a whole number from 1 to 65535.`);
  }
  return port;
}

async function refuseTakenPort(port) {
  const trouble = await portTrouble(port, process.env.STEPWELL_HOST || undefined);
  if (trouble === null) return;
  const other = `Choose another: PORT=${port < 65535 ? port + 1 : 3000} npm start`;
  if (trouble === 'EADDRINUSE') throw new StartRefused(`Port ${port} is in use by another program. ${other}`);
  if (trouble === 'EACCES') throw new StartRefused(`This user may not listen on port ${port}. ${other}`);
  throw new StartRefused(`Port ${port} cannot be listened on (${trouble}). ${other}`);
}

function chosenKind() {
  const { STEPWELL_DEMO: demo = '', DATABASE_URL: given } = process.env;
  if (!['', '0', '1'].includes(demo)) throw new StartRefused(`STEPWELL_DEMO is “${demo}”; it may be 0 or 1.`);
  if (demo !== '') return demo === '1' ? 'demo' : 'production';
  return given ? 'production' : 'demo';
}

/** Starts a part now and keeps it running; the parts are stopped from the last to the first. */
async function keepRunning(part) {
  parts.push(part);
  try {
    await part.start();
  } catch (error) {
    throw new StartRefused(`The ${part.name} could not be started: ${error.message}`, { cause: error });
  }
}

/** Ends what a start that was killed left running: first those who write, then the database. */
async function stopLeftOvers(places) {
  for (const name of ['web server', 'worker']) {
    await new Part(name, null, { runFolder, say }).stopLeftOver();
  }
  const database = findRunningDatabase(places);
  if (database) {
    say('An earlier start was killed and left its database running; it is stopped and started again.');
    await stopProcess(database, { graceMs: 60_000 });
  }
}

async function startPrivateDatabase(places, secrets) {
  await ensureProgram('mariadbd', 'mariadb-server', { say, children, log: path.join(logFolder, 'apt.log') });
  let port = 0;
  const start = async () => {
    const started = await startDatabase(places, { statements: installationStatements(secrets), children });
    if (port !== 0 && port !== started.port) {
      await stopProcess(identify(started.child.pid), { graceMs: 60_000 });
      throw new Error(`its port ${port} was taken by another program meanwhile`);
    }
    port = started.port;
    return started.child;
  };
  await keepRunning(new Part('database', start, { runFolder, say, graceMs: 60_000 }));
  return {
    DATABASE_URL: databaseUrl('stepwell_app', secrets.databaseApplicationPassword, port, 'stepwell'),
    DATABASE_OWNER_URL: databaseUrl('stepwell_owner', secrets.databaseOwnerPassword, port, 'stepwell'),
  };
}

function sayWhereThingsAre(address, prepared, hasMailServer) {
  const lines = ['', `Stepwell runs at ${address}`];
  if (prepared.accounts.length > 0) {
    lines.push('', 'Demo accounts (invented people, for this demo only):');
    const width = Math.max(...prepared.accounts.map(({ email }) => email.length));
    for (const { email, password, description } of prepared.accounts) {
      lines.push(`  ${email.padEnd(width)}  ${password}  ${description}`);
    }
  }
  if (prepared.firstAdministratorLink) {
    lines.push(
      '',
      'Create the first administrator with this link, once:',
      `  ${prepared.firstAdministratorLink}`,
    );
  }
  if (prepared.kind === 'demo' && !hasMailServer)
    lines.push('', `Caught mail is read at ${address}/caught-mail`);
  if (prepared.kind === 'production' && !hasMailServer) {
    lines.push('', 'SMTP_URL is not set: mail is held until it is.');
  }
  for (const warning of prepared.warnings) lines.push('', `Note: ${warning}`);
  lines.push('', 'Ctrl-C stops it.', '');
  say(lines.join('\n'));
}

async function start() {
  const port = chosenPort();
  const kind = chosenKind();
  const holder = takeLock(lockFile, { port });
  if (holder) {
    throw new StartRefused(
      `Stepwell runs from this folder already, at http://localhost:${holder.port} (process ${holder.pid}).`,
    );
  }
  const places = databasePlaces(dataFolder);
  await stopLeftOvers(places);
  await refuseTakenPort(port);
  await ensureNodeModules(root, { say, children, log: path.join(logFolder, 'npm-ci.log') });

  const secrets = installationSecrets(dataFolder);
  const address = (process.env.STEPWELL_URL || `http://localhost:${port}`).replace(/\/+$/, '');
  const isPrivate = !process.env.DATABASE_URL;
  const { DATABASE_OWNER_URL: givenOwner, ...given } = process.env;
  const addresses = isPrivate
    ? await startPrivateDatabase(places, secrets)
    : { DATABASE_URL: given.DATABASE_URL, ...(givenOwner ? { DATABASE_OWNER_URL: givenOwner } : {}) };
  // Only the preparation gets the owner's address; the servers never hold it.
  const env = {
    ...given,
    DATABASE_URL: addresses.DATABASE_URL,
    PORT: String(port),
    STEPWELL_URL: address,
    NEXTAUTH_URL: address,
    NEXTAUTH_SECRET: process.env.NEXTAUTH_SECRET || secrets.nextAuthSecret,
  };
  const prepared = await prepareDatabase(root, { ...env, ...addresses }, { kind, isPrivate, children });
  if (prepared.kind !== kind && process.env.STEPWELL_DEMO) {
    say(
      `The database was created as a ${prepared.kind} one and stays so; STEPWELL_DEMO applies to a new database.`,
    );
  }

  if (!isDevelopment) await ensureBuild(root, { say, children, log: path.join(logFolder, 'build.log') });
  const startOfWorker = () => startWorker(root, env);
  const startOfWeb = () => startWeb(root, env, { isDevelopment });
  await Promise.all([
    keepRunning(new Part('worker', startOfWorker, { runFolder, say })),
    keepRunning(new Part('web server', startOfWeb, { runFolder, say, graceMs: 5_000 })),
  ]);
  sayWhereThingsAre(address, prepared, Boolean(given.SMTP_URL));
}

/** Stops everything, the last started first, so that nobody writes to a database that is gone. */
function stop(exitCode) {
  stopping ??= (async () => {
    process.exitCode = exitCode;
    for (const child of children) child.kill('SIGTERM');
    while (parts.length > 0) await parts.pop().stop();
    releaseLock(lockFile);
    process.exit(exitCode);
  })();
  return stopping;
}

for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(name, () => {
    if (!stopping) say('\nStopping …');
    stop(0);
  });
}
process.on('uncaughtException', (error) => {
  console.error(error);
  stop(1);
});

start().catch((error) => {
  if (stopping) return;
  console.error(
    error instanceof StartRefused ? error.message : `Stepwell could not be started. ${error.message}`,
  );
  stop(1);
});
