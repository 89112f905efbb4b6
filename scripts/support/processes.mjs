import { spawn } from 'node:child_process';
import { mkdirSync, openSync, readFileSync, closeSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';

/** Pauses for some milliseconds. */
export const pause = (milliseconds) => new Promise((resolve) => setTimeout(resolve, milliseconds));

/**
 * When a process began, in the kernel's ticks: with its number it names one process for good, since numbers
 * are used again. Null when there is no such process, or only its unreaped remains.
 */
function startTicks(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'latin1');
    // The second field is the name in brackets and may hold anything; the state and the rest follow it.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    return fields[0] === 'Z' ? null : fields[19];
  } catch (error) {
    if (error.code === 'ENOENT' || error.code === 'ESRCH') return null;
    throw error;
  }
}

/** What to remember of a running process, to know it again later; null when it has ended. */
export function identify(pid) {
  const ticks = startTicks(pid);
  return ticks === null ? null : { pid, ticks };
}

/** Whether exactly that process still runs. */
export function isRunning(identity) {
  return identity !== null && startTicks(identity.pid) === identity.ticks;
}

/** The command line of a process, as a list; empty when it has ended. */
export function commandLine(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').filter(Boolean);
  } catch (error) {
    if (error.code === 'ENOENT' || error.code === 'ESRCH') return [];
    throw error;
  }
}

function signal(identity, name, wholeGroup) {
  try {
    process.kill(wholeGroup ? -identity.pid : identity.pid, name);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

/**
 * Asks a process to end, and kills it when it has not within the time.
 * @param identity from `identify`
 * @param options.graceMs how long it may take
 * @param options.wholeGroup whether its process group is meant (children started `detached`)
 */
export async function stopProcess(identity, { graceMs = 10_000, wholeGroup = false } = {}) {
  if (!isRunning(identity)) return;
  signal(identity, 'SIGTERM', wholeGroup);
  const giveUpAt = Date.now() + graceMs;
  while (isRunning(identity) && Date.now() < giveUpAt) await pause(20);
  if (!isRunning(identity)) return;
  signal(identity, 'SIGKILL', wholeGroup);
  while (isRunning(identity)) await pause(20);
}

/** Reads a JSON file; null when there is none or it is broken (a start was killed while it wrote). */
export function readJson(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch (error) {
    if (error.code === 'ENOENT' || error instanceof SyntaxError) return null;
    throw error;
  }
}

/** Writes a JSON file as a whole or not at all. */
export function writeJson(file, value, mode = 0o644) {
  mkdirSync(path.dirname(file), { recursive: true });
  const temporary = `${file}.${process.pid}.new`;
  writeFileSync(temporary, `${JSON.stringify(value, null, 2)}\n`, { mode });
  renameSync(temporary, file);
}

/**
 * Takes a lock that ends with this process: a file naming the process that holds it.
 * @param file the lock's path
 * @param note kept with it, for the one who finds it taken
 * @returns null when taken, or what the living holder wrote
 */
export function takeLock(file, note) {
  mkdirSync(path.dirname(file), { recursive: true });
  for (;;) {
    try {
      const handle = openSync(file, 'wx');
      writeFileSync(handle, JSON.stringify({ ...identify(process.pid), ...note }));
      closeSync(handle);
      return null;
    } catch (error) {
      if (error.code !== 'EEXIST') throw error;
    }
    const holder = readJson(file);
    if (holder && isRunning(holder)) return holder;
    rmSync(file, { force: true });
  }
}

/** Gives back a lock, when it is this process's. */
export function releaseLock(file) {
  if (readJson(file)?.pid === process.pid) rmSync(file, { force: true });
}

/**
 * Runs a command to its end.
 * @param options.log a file that takes its output; without it the output is shown
 * @param options.children a set that holds the child while it runs, so that an interruption can end it
 * @throws Error with the command's name and its last lines when it fails
 */
export function run(command, args, { env = process.env, cwd, log, children } = {}) {
  return new Promise((resolve, reject) => {
    if (log) mkdirSync(path.dirname(log), { recursive: true });
    const output = log ? openSync(log, 'w') : 'inherit';
    const child = spawn(command, args, { env, cwd, stdio: ['ignore', output, output] });
    children?.add(child);
    child.once('error', reject);
    child.once('close', (code, name) => {
      children?.delete(child);
      if (log) closeSync(output);
      if (code === 0) return resolve();
      const tail = log ? `\n${readFileSync(log, 'utf8').split('\n').slice(-40).join('\n')}` : '';
      const error = new Error(`${path.basename(command)} ${args[0] ?? ''} failed (${name ?? code}).${tail}`);
      error.tail = tail;
      reject(error);
    });
  });
}

/** Runs a command to its end and returns what it printed on standard output; its complaints are shown. */
export function read(command, args, { env = process.env, cwd, children } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { env, cwd, stdio: ['ignore', 'pipe', 'inherit'] });
    children?.add(child);
    let printed = '';
    child.stdout.setEncoding('utf8').on('data', (text) => (printed += text));
    child.once('error', reject);
    child.once('close', (code, name) => {
      children?.delete(child);
      if (code === 0) resolve(printed);
      else reject(new Error(`${path.basename(args.at(-1) ?? command)} failed (${name ?? code}).`));
    });
  });
}
