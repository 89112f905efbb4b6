import net from 'node:net';
import path from 'node:path';
import { read, pause } from './processes.mjs';
import { spawnPart } from './parts.mjs';

const LONGEST_START_MS = 60_000;
/** What the production server says of itself at each start; the start script says it in its own words. */
const GREETING = /^\s*$|^\s*(▲ Next\.js|- (Local|Network):|✓ (Ready|Starting|Running next\.config))/;

/** Waits until the web server takes connections, or says that it ended first. */
async function untilItAnswers(child, port) {
  const giveUpAt = Date.now() + LONGEST_START_MS;
  while (Date.now() < giveUpAt) {
    if (child.exitCode !== null || child.signalCode !== null) {
      throw new Error(`it ended while starting (${child.signalCode ?? child.exitCode})`);
    }
    const answers = await new Promise((resolve) => {
      const socket = net.connect({ port, host: 'localhost' }, () => {
        socket.destroy();
        resolve(true);
      });
      socket.once('error', () => resolve(false));
    });
    if (answers) return;
    await pause(50);
  }
  throw new Error('it did not answer within a minute');
}

/**
 * Starts the web server and waits until it answers.
 * @param root the project's folder
 * @param env its environment: DATABASE_URL, PORT, NEXTAUTH_SECRET …
 * @param options.isDevelopment the development server instead of the production build
 * @param options.folder where the build stands, when it is not the project's
 */
export async function startWeb(root, env, { isDevelopment = false, folder = root } = {}) {
  const preload = path.join(root, 'scripts/support/exit-with-parent.mjs');
  const next = path.join(root, 'node_modules/next/dist/bin/next');
  const host = env.STEPWELL_HOST ? ['--hostname', env.STEPWELL_HOST] : [];
  const child = spawnPart(
    process.execPath,
    ['--import', preload, next, isDevelopment ? 'dev' : 'start', '--port', env.PORT, ...host],
    {
      cwd: folder,
      env: { ...env, NODE_ENV: isDevelopment ? 'development' : 'production', NEXT_TELEMETRY_DISABLED: '1' },
      prefix: 'web',
      ...(isDevelopment ? {} : { unsaid: GREETING }),
    },
  );
  await untilItAnswers(child, Number(env.PORT));
  return child;
}

/** Starts the worker and waits until it says that it is ready. */
export async function startWorker(root, env) {
  const preload = path.join(root, 'scripts/support/exit-with-parent.mjs');
  const child = spawnPart(
    process.execPath,
    ['--import', preload, '--import', 'tsx', path.join(root, 'lib/worker/main.ts')],
    { cwd: root, env: { ...env, NODE_ENV: 'production' }, prefix: 'worker' },
  );
  await new Promise((resolve, reject) => {
    child.once('message', resolve);
    child.once('error', reject);
    child.once('exit', (code, signal) => reject(new Error(`it ended while starting (${signal ?? code})`)));
  });
  return child;
}

/**
 * Migrates a database, marks and fills a new one (scripts/prepare-database.ts).
 * @returns what that script printed as its last line, parsed
 * @throws Error when it failed; why stands on standard error then
 */
export async function prepareDatabase(root, env, { kind, isPrivate, children }) {
  const script = path.join(root, 'scripts/prepare-database.ts');
  let printed;
  try {
    printed = await read(
      process.execPath,
      ['--import', 'tsx', script, kind, isPrivate ? 'private' : 'given'],
      { cwd: root, env: { ...env, NODE_ENV: 'production' }, children },
    );
  } catch (error) {
    // The script has said why on standard error.
    throw new Error('The database could not be made ready (see above).', { cause: error });
  }
  return JSON.parse(printed.trim().split('\n').at(-1));
}
