/*
 * Runs a script on the installation's database: node scripts/with-database.mjs scripts/verify-trail.ts. The database is
 * the one of DATABASE_URL, else the private one that the start command runs.
 */
import { spawn } from 'node:child_process';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { databasePlaces, databaseUrl, findRunningDatabase } from './support/mariadb.mjs';
import { readJson } from './support/processes.mjs';
import { installationSecrets } from './support/secrets.mjs';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..');

/** The application user's address of the private database, or null while it does not run. */
function privateDatabaseUrl() {
  const dataFolder = path.join(root, '.data');
  const places = databasePlaces(dataFolder);
  const port = readJson(places.settings)?.port;
  if (!findRunningDatabase(places) || !Number.isInteger(port)) return null;
  const { databaseApplicationPassword } = installationSecrets(dataFolder);
  return databaseUrl('stepwell_app', databaseApplicationPassword, port, 'stepwell');
}

const [script, ...rest] = process.argv.slice(2);
const url = process.env.DATABASE_URL || privateDatabaseUrl();
if (!script || !url) {
  console.error(
    script
      ? 'The database does not run. Start Stepwell first (npm start), or set DATABASE_URL.'
      : 'Name the script to run.',
  );
  process.exitCode = 2;
} else {
  const child = spawn(process.execPath, ['--import', 'tsx', path.resolve(root, script), ...rest], {
    cwd: root,
    env: { ...process.env, DATABASE_URL: url },
    stdio: 'inherit',
  });
  for (const name of ['SIGINT', 'SIGTERM']) process.on(name, () => child.kill(name));
  child.on('error', (error) => {
    console.error(error.message);
    process.exitCode = 2;
  });
  child.on('exit', (code) => {
    process.exitCode = code ?? 2;
  });
}
