import { accessSync, constants, existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { read, run, readJson } from './processes.mjs';

const SYSTEM_FOLDERS = ['/usr/local/sbin', '/usr/local/bin', '/usr/sbin', '/usr/bin', '/sbin', '/bin'];

/** Where a program stands, looking where `PATH` says and where Debian puts programs; null when nowhere. */
export function findProgram(name) {
  const folders = [...(process.env.PATH ?? '').split(path.delimiter), ...SYSTEM_FOLDERS].filter(Boolean);
  for (const folder of folders) {
    const file = path.join(folder, name);
    try {
      accessSync(file, constants.X_OK);
      return file;
    } catch (error) {
      if (!['ENOENT', 'EACCES', 'ENOTDIR', 'ELOOP'].includes(error.code)) throw error;
    }
  }
  return null;
}

/** Whether `node_modules` holds every package of `package-lock.json` in the version it names. */
export function nodeModulesAreCurrent(root) {
  const lock = JSON.parse(readFileSync(path.join(root, 'package-lock.json'), 'utf8'));
  // npm writes this file last, so that an interrupted installation leaves none.
  const installed = readJson(path.join(root, 'node_modules', '.package-lock.json'));
  if (!installed) return false;
  return Object.entries(lock.packages).every(([place, { version, optional, devOptional }]) => {
    if (place === '') return true;
    const found = installed.packages[place];
    return found ? found.version === version : Boolean(optional || devOptional);
  });
}

/** Installs the packages of the lock file when they are missing or others. */
export async function ensureNodeModules(root, { say, children, log }) {
  if (nodeModulesAreCurrent(root)) return;
  say('Installing the packages of package-lock.json (about half a minute) …');
  const npm = process.env.npm_execpath;
  const [command, before] = npm && existsSync(npm) ? [process.execPath, [npm]] : ['npm', []];
  await run(command, [...before, 'ci', '--include=dev', '--no-audit', '--no-fund'], {
    cwd: root,
    children,
    log,
  });
}

/** How to become root for a package installation: '' as root, a sudo command, or null when there is no way. */
function rootPrefix() {
  if (process.getuid?.() === 0) return [];
  const sudo = findProgram('sudo');
  if (!sudo) return null;
  return process.stdin.isTTY ? [sudo] : [sudo, '-n'];
}

/**
 * Makes sure that a program of a Debian package is there.
 * @param program the program's name
 * @param debianPackage the package that brings it
 * @returns where it stands
 * @throws Error with what to install, when this cannot be done from here
 */
export async function ensureProgram(program, debianPackage, { say, children, log, find = findProgram }) {
  const found = find(program);
  if (found) return found;
  const advice = `Install it and start again: apt-get install ${debianPackage} (as root).`;
  const prefix = rootPrefix();
  const apt = findProgram('apt-get');
  if (!apt || !prefix) {
    throw new Error(
      `${program} is missing, and ${apt ? 'this user may not install packages' : 'this system has no apt-get'}. ${advice}`,
    );
  }
  say(`Installing Debian's ${debianPackage} …`);
  const [command, ...before] = [...prefix, 'env', 'DEBIAN_FRONTEND=noninteractive', apt];
  try {
    await run(command, [...before, 'update', '-q'], { children, log });
    await run(command, [...before, 'install', '-y', '-q', '--no-install-recommends', debianPackage], {
      children,
      log,
    });
  } catch (error) {
    throw new Error(`${debianPackage} could not be installed. ${advice}\n${error.message}`, { cause: error });
  }
  const installed = find(program);
  if (!installed) throw new Error(`${debianPackage} is installed, but ${program} is not found. ${advice}`);
  return installed;
}

/** The version a program tells of itself. */
export async function versionOf(program) {
  return (await read(program, ['--version'])).trim();
}
