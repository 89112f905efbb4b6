import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, rmSync, statSync } from 'node:fs';
import path from 'node:path';
import { isRunning, readJson, run, writeJson } from './processes.mjs';

/** What the production build is made from. */
const SOURCES = [
  'app',
  'components',
  'emails',
  'lib',
  'migrations',
  'models',
  'public',
  'proxy.ts',
  'instrumentation.ts',
  'next.config.ts',
  'postcss.config.mjs',
  'package.json',
  'package-lock.json',
  'tsconfig.json',
];
const stampFile = (root) => path.join(root, '.next', 'stepwell-build.json');

function* filesOf(place) {
  if (!existsSync(place)) return;
  if (!statSync(place).isDirectory()) {
    yield place;
    return;
  }
  for (const name of readdirSync(place).sort()) yield* filesOf(path.join(place, name));
}

/** A digest of every source file's name and content, tests left out: the same sources give the same one. */
export function sourcesDigest(root) {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    for (const file of filesOf(path.join(root, source))) {
      if (/\.test\.tsx?$/.test(file)) continue;
      hash.update(path.relative(root, file)).update('\0').update(readFileSync(file)).update('\0');
    }
  }
  return hash.digest('hex');
}

/** Whether the build was made, to its end, from the sources as they are. */
export function buildIsCurrent(root, digest = sourcesDigest(root)) {
  return readJson(stampFile(root))?.sources === digest;
}

/** Builds when the build is older than the sources. The stamp is written last, so that half a build is none. */
export async function ensureBuild(root, { say, children, log }) {
  const digest = sourcesDigest(root);
  if (buildIsCurrent(root, digest)) return;
  say('Building (about half a minute) …');
  rmSync(stampFile(root), { force: true });
  try {
    await run(process.execPath, [path.join(root, 'node_modules/next/dist/bin/next'), 'build'], {
      cwd: root,
      env: { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
      children,
      log,
    });
  } catch (error) {
    throw new Error(`The build failed.${error.tail}`, { cause: error });
  }
  writeJson(stampFile(root), { sources: digest, builtAt: new Date().toISOString() });
}

/** Builds when needed, for tests and the bench; a build that the start command serves now must not be replaced. */
export async function ensureBuildBesideInstallation(root, options) {
  const holder = readJson(path.join(root, '.data', 'run', 'start.json'));
  if (holder && isRunning(holder) && !buildIsCurrent(root)) {
    throw new Error('Stepwell runs from this folder with an older build. Stop it, and try again.');
  }
  await ensureBuild(root, options);
}
