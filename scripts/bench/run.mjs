/*
 * Measures speed and size on this machine: npm run bench, or npm run bench -- --json FILE. Over a throw-away MariaDB with the
 * settings of an installation it serves the production build with the demo loaded, and beside it a bare page of the same
 * framework, measures both (scripts/bench/measure.ts), and stops all of it. Figures beyond their aim are printed, not failed.
 */
import { randomBytes } from 'node:crypto';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { prepareDatabase, startWeb } from '../support/application.mjs';
import { ensureBuildBesideInstallation } from '../support/build.mjs';
import { withoutInstallationSettings } from '../support/environment.mjs';
import { databaseUrl, installationStatements } from '../support/mariadb.mjs';
import { ensureNodeModules, ensureProgram } from '../support/packages.mjs';
import { freePort } from '../support/ports.mjs';
import { identify, run, stopProcess } from '../support/processes.mjs';
import { startThrowAwayDatabase } from '../support/throw-away-database.mjs';
import { ensureBareBuild, startBarePage } from './bare-server.mjs';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
const logFolder = path.join(root, '.data', 'log');

const say = (text) => console.error(text);
/** Commands at work now: an interruption ends them. */
const children = new Set();
const servers = [];
let database = null;
let stopping = null;

/** The file after `--json`, or null. */
function chosenFile() {
  const words = process.argv.slice(2);
  if (words.length === 0) return null;
  const [option, file, ...rest] = words;
  if (option !== '--json' || !file || rest.length > 0) {
    throw new Error('Write npm run bench, or npm run bench -- --json FILE.');
  }
  return path.resolve(process.env.INIT_CWD ?? process.cwd(), file);
}

/** Starts a database server like an installation's, commits that reach the disk included. */
async function startBenchDatabase() {
  await ensureProgram('mariadbd', 'mariadb-server', { say, children, log: path.join(logFolder, 'apt.log') });
  database = await startThrowAwayDatabase(root, {
    statements: (password) =>
      installationStatements({
        databaseRootPassword: password,
        databaseOwnerPassword: password,
        databaseApplicationPassword: password,
      }),
    settings: [],
  });
  const address = (user) => databaseUrl(user, database.password, database.port, 'stepwell');
  return { DATABASE_URL: address('stepwell_app'), DATABASE_OWNER_URL: address('stepwell_owner') };
}

async function main() {
  const jsonFile = chosenFile();
  await ensureNodeModules(root, { say, children, log: path.join(logFolder, 'npm-ci.log') });
  await ensureBuildBesideInstallation(root, { say, children, log: path.join(logFolder, 'build.log') });
  const bareFolder = await ensureBareBuild(root, {
    say,
    children,
    log: path.join(logFolder, 'bare-build.log'),
  });
  const databases = await startBenchDatabase();

  const [port, barePort] = [await freePort(), await freePort()];
  const url = `http://localhost:${port}`;
  const env = {
    ...withoutInstallationSettings(process.env),
    DATABASE_URL: databases.DATABASE_URL,
    PORT: String(port),
    STEPWELL_URL: url,
    NEXTAUTH_URL: url,
    NEXTAUTH_SECRET: randomBytes(32).toString('base64url'),
    STEPWELL_LOG_LEVEL: 'warn',
    NODE_ENV: 'production',
  };
  await prepareDatabase(root, { ...env, ...databases }, { kind: 'demo', isPrivate: true, children });
  servers.push(await startWeb(root, env));
  servers.push(
    await startBarePage(root, bareFolder, { port: barePort, databaseUrl: databases.DATABASE_URL }),
  );

  const settings = {
    root,
    url,
    bareUrl: `http://localhost:${barePort}`,
    counterUrl: databases.DATABASE_OWNER_URL,
    jsonFile,
  };
  const measureFile = path.join(root, 'scripts/bench/measure.ts');
  await run(process.execPath, ['--import', 'tsx', measureFile], {
    cwd: root,
    env: { ...env, STEPWELL_BENCH: JSON.stringify(settings) },
    children,
  });
}

function stop(exitCode) {
  stopping ??= (async () => {
    for (const child of children) child.kill('SIGTERM');
    for (const { pid } of servers) {
      const identity = identify(pid);
      if (identity) await stopProcess(identity, { graceMs: 5_000, wholeGroup: true });
    }
    await database?.stop();
    process.exit(exitCode);
  })();
}

for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(name, () => stop(130));

main().then(
  () => stop(0),
  (error) => {
    if (stopping) return;
    console.error(`The bench could not be run to its end. ${error.message}`);
    stop(1);
  },
);
