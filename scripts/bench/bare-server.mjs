import { createHash } from 'node:crypto';
import { cpSync, mkdirSync, readFileSync, readdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { startWeb } from '../support/application.mjs';
import { readJson, run, writeJson } from '../support/processes.mjs';

/** A digest of the bare page's sources and of the versions it is built with. */
function digestOf(root, sources) {
  const hash = createHash('sha256').update(readFileSync(path.join(root, 'package-lock.json')));
  for (const entry of readdirSync(sources, { recursive: true, withFileTypes: true })) {
    if (!entry.isFile()) continue;
    const file = path.join(entry.parentPath, entry.name);
    hash.update(path.relative(sources, file)).update('\0').update(readFileSync(file)).update('\0');
  }
  return hash.digest('hex');
}

/**
 * Builds the bare page (scripts/bench/bare-page) in a folder of its own, once for its sources and versions.
 * @param root the project's folder
 * @returns the folder it is built in
 */
export async function ensureBareBuild(root, { say, children, log }) {
  const sources = path.join(root, 'scripts/bench/bare-page');
  const folder = path.join(root, '.data', 'bench-bare');
  const stamp = path.join(folder, 'built.json');
  const digest = digestOf(root, sources);
  if (readJson(stamp)?.digest === digest) return folder;
  say('Building the bare page that the pages are compared with …');
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  cpSync(sources, folder, { recursive: true });
  await run(process.execPath, [path.join(root, 'node_modules/next/dist/bin/next'), 'build'], {
    cwd: folder,
    env: { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
    children,
    log,
  });
  writeJson(stamp, { digest });
  return folder;
}

/**
 * Serves the bare page.
 * @param folder where `ensureBareBuild` built it
 * @param settings.port where it listens
 * @param settings.databaseUrl the database of the application, where its one query goes
 */
export function startBarePage(root, folder, { port, databaseUrl }) {
  return startWeb(root, { ...process.env, PORT: String(port), BARE_DATABASE_URL: databaseUrl }, { folder });
}
