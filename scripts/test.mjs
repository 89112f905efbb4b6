/*
 * Runs every test of the project with one command, on a machine that has only Node.js: installs what is missing,
 * starts a throw-away MariaDB, and closes with one line, "N passed, N failed". Parts can be named:
 * npm test -- lint unit database browser; words after "--" choose test files by their path.
 */
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureBuildBesideInstallation } from './support/build.mjs';
import { CHROMIUM_NAMES } from './support/chromium.mjs';
import { withoutInstallationSettings } from './support/environment.mjs';
import { ensureNodeModules, ensureProgram, findProgram } from './support/packages.mjs';
import { countCheck, countTests } from './support/test-runs.mjs';
import { startThrowAwayDatabase } from './support/throw-away-database.mjs';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..');
const logFolder = path.join(root, '.data', 'log');
const PARTS = ['lint', 'unit', 'database', 'browser'];

const say = (text) => console.log(text);
const children = new Set();
let database = null;
let stopping = null;
const total = { passed: 0, failed: 0 };

function chosen() {
  const words = process.argv.slice(2);
  const parts = words.filter((word) => PARTS.includes(word));
  const filters = words.filter((word) => !PARTS.includes(word) && word !== '--');
  return { parts: parts.length > 0 ? parts : PARTS, filters };
}

function add(counts) {
  total.passed += counts.passed;
  total.failed += counts.failed;
}

const bin = (place) => path.join(root, 'node_modules', place);

async function lint() {
  const options = { cwd: root, children };
  say('\nLint');
  add(
    await countCheck(
      'Lint',
      process.execPath,
      [bin('eslint/bin/eslint.js'), '.', '--max-warnings', '0'],
      options,
    ),
  );
  say('\nFormat');
  add(
    await countCheck('Format', process.execPath, [bin('prettier/bin/prettier.cjs'), '--check', '.'], options),
  );
  say('\nTypes');
  // The framework writes the types of the routes and of imported files; a fresh clone has none.
  const typegen = await countCheck('Route types', process.execPath, [bin('next/dist/bin/next'), 'typegen'], {
    ...options,
    log: path.join(logFolder, 'typegen.log'),
  });
  if (typegen.failed > 0) return add(typegen);
  add(await countCheck('Types', process.execPath, [bin('typescript/bin/tsc'), '--noEmit'], options));
}

async function startDatabaseOnce() {
  if (database) return;
  await ensureProgram('mariadbd', 'mariadb-server', { say, children, log: path.join(logFolder, 'apt.log') });
  database = await startThrowAwayDatabase(root);
}

/** The environment of a run. */
function testEnvironment() {
  const env = { ...withoutInstallationSettings(process.env), VITE_CONFIG_NATIVE_IGNORE_WARNING: 'true' };
  if (database) {
    const { port, password, pid } = database;
    env.STEPWELL_TEST_DATABASE = JSON.stringify({ port, password, pid });
  }
  return env;
}

async function runPart(part, filters) {
  if (part === 'lint') return lint();
  if (part === 'unit') {
    say('\nUnit and component tests');
    return add(
      await countTests(root, 'vitest.config.ts', filters, { env: testEnvironment(), children, say }),
    );
  }
  await startDatabaseOnce();
  if (part === 'browser') {
    const find = () => CHROMIUM_NAMES.map(findProgram).find(Boolean) ?? null;
    await ensureProgram('chromium', 'chromium', {
      say,
      children,
      log: path.join(logFolder, 'apt.log'),
      find,
    });
    await ensureBuildBesideInstallation(root, { say, children, log: path.join(logFolder, 'build.log') });
  }
  say(part === 'database' ? '\nDatabase tests' : '\nBrowser tests');
  add(await countTests(root, `vitest.${part}.config.ts`, filters, { env: testEnvironment(), children, say }));
}

async function main() {
  const { parts, filters } = chosen();
  await ensureNodeModules(root, { say, children, log: path.join(logFolder, 'npm-ci.log') });
  for (const part of parts) {
    if (stopping) return;
    try {
      await runPart(part, filters);
    } catch (error) {
      if (stopping) return;
      // One part that cannot run must not hide the others' results.
      console.error(`The ${part} tests could not be run. ${error.message}`);
      total.failed += 1;
    }
  }
}

function stop(exitCode) {
  stopping ??= (async () => {
    for (const child of children) child.kill('SIGTERM');
    await database?.stop();
    if (exitCode !== 130) say(`\n${total.passed} passed, ${total.failed} failed`);
    process.exit(exitCode);
  })();
}

for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(name, () => stop(130));

main().then(
  () => stop(total.failed > 0 || total.passed === 0 ? 1 : 0),
  (error) => {
    if (stopping) return;
    console.error(`The tests could not be run. ${error.message}`);
    total.failed += 1;
    stop(1);
  },
);
