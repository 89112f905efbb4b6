import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { readJson, run } from './processes.mjs';

/** @typedef {{ passed: number, failed: number }} Counts */

/**
 * Runs a command that either passes or fails as a whole, and counts it as one test.
 * @returns {Promise<Counts>}
 */
export async function countCheck(name, command, args, options) {
  try {
    await run(command, args, options);
    return { passed: 1, failed: 0 };
  } catch (error) {
    console.error(`${name} failed: ${error.message}`);
    return { passed: 0, failed: 1 };
  }
}

/** What a report of vitest counts; a file that could not be loaded holds no test and counts as one failure. */
function countReport(report) {
  const broken = report.testResults.filter(
    ({ status, assertionResults }) => status === 'failed' && assertionResults.length === 0,
  );
  return { passed: report.numPassedTests, failed: report.numFailedTests + broken.length };
}

/**
 * Runs vitest with a configuration and counts its tests.
 * @param root the project's folder
 * @param config the configuration file
 * @param filters words a test file's path must hold; none for all files
 * @returns {Promise<Counts>} a run that fails without a failed test (an error outside one, no report) counts as one
 */
export async function countTests(root, config, filters, { env, children, say }) {
  const folder = path.join(root, '.data', 'test-reports');
  mkdirSync(folder, { recursive: true });
  const file = path.join(folder, `${randomBytes(6).toString('hex')}.json`);
  let runError = null;
  try {
    await run(
      process.execPath,
      [
        path.join(root, 'node_modules/vitest/vitest.mjs'),
        'run',
        '--config',
        config,
        '--reporter=default',
        '--reporter=json',
        `--outputFile.json=${file}`,
        ...filters,
      ],
      { cwd: root, env, children },
    );
  } catch (error) {
    runError = error;
  }
  const report = existsSync(file) ? readJson(file) : null;
  rmSync(file, { force: true });
  const counts = report ? countReport(report) : { passed: 0, failed: 0 };
  if (runError && counts.failed === 0) {
    say(`${config}: ${runError.message}`);
    counts.failed = 1;
  }
  return counts;
}
