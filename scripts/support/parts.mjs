import { spawn } from 'node:child_process';
import { rmSync } from 'node:fs';
import path from 'node:path';
import { identify, pause, readJson, stopProcess, writeJson } from './processes.mjs';

const FIRST_PAUSE_MS = 250;
const LONGEST_PAUSE_MS = 10_000;
/** A part that ran this long was well: the next end is not counted with the earlier ones. */
const WELL_AFTER_MS = 30_000;

/**
 * Starts a process of a part in a group of its own, so that a Ctrl-C reaches only the one who stops them in order.
 * What it prints is shown line by line.
 * @param options.prefix stands before each line
 * @param options.unsaid lines that are not shown
 */
export function spawnPart(command, args, { cwd, env, prefix, unsaid = /^\s*$/ }) {
  const child = spawn(command, args, { cwd, env, detached: true, stdio: ['ignore', 'pipe', 'pipe', 'ipc'] });
  for (const [stream, target] of [
    [child.stdout, process.stdout],
    [child.stderr, process.stderr],
  ]) {
    let rest = '';
    stream.setEncoding('utf8').on('data', (text) => {
      const lines = (rest + text).split('\n');
      rest = lines.pop() ?? '';
      for (const line of lines) if (!unsaid.test(line)) target.write(`${prefix} | ${line}\n`);
    });
  }
  return child;
}

/**
 * A process that is kept running: started again, after a growing pause, when it ends by itself.
 * @param name shown to people, and the name of the file that remembers its process number
 * @param start starts it and returns the child process once it serves
 * @param runFolder where process numbers are kept, so that a start after a kill -9 finds what was left
 */
export class Part {
  name;
  #start;
  #file;
  #say;
  #graceMs;
  #child = null;
  #isStopping = false;
  #tries = 0;
  #restarting = Promise.resolve();

  constructor(name, start, { runFolder, say, graceMs = 10_000 }) {
    this.name = name;
    this.#start = start;
    this.#file = path.join(runFolder, `${name}.json`);
    this.#say = say;
    this.#graceMs = graceMs;
  }

  /** Ends what an earlier start left running. */
  async stopLeftOver() {
    const identity = readJson(this.#file);
    if (identity) await stopProcess(identity, { graceMs: this.#graceMs, wholeGroup: true });
    rmSync(this.#file, { force: true });
  }

  /** Starts it for the first time; an error here is the caller's to show. */
  async start() {
    if (this.#isStopping) return;
    const child = await this.#start();
    const startedAt = Date.now();
    this.#child = child;
    const identity = identify(child.pid);
    if (identity) writeJson(this.#file, identity);
    const onEnd = (code, signal) => {
      this.#child = null;
      if (this.#isStopping) return;
      if (Date.now() - startedAt > WELL_AFTER_MS) this.#tries = 0;
      this.#say(`The ${this.name} ended (${signal ?? code}); it is started again.`);
      this.#restarting = this.#restart();
    };
    if (child.exitCode !== null || child.signalCode !== null) onEnd(child.exitCode, child.signalCode);
    else child.once('exit', onEnd);
    // Stopped while it was starting: its own end was not in anybody's hands yet.
    if (this.#isStopping) await this.stop();
  }

  async #restart() {
    const wait = Math.min(LONGEST_PAUSE_MS, FIRST_PAUSE_MS * 2 ** this.#tries);
    this.#tries += 1;
    await pause(wait);
    if (this.#isStopping) return;
    try {
      await this.start();
      if (!this.#isStopping) this.#say(`The ${this.name} runs again.`);
    } catch (error) {
      this.#say(`The ${this.name} could not be started: ${error.message}`);
      if (!this.#isStopping) this.#restarting = this.#restart();
    }
  }

  /** Ends it for good. */
  async stop() {
    this.#isStopping = true;
    const child = this.#child;
    if (child?.pid) {
      const identity = identify(child.pid);
      if (identity) await stopProcess(identity, { graceMs: this.#graceMs, wholeGroup: true });
    }
    rmSync(this.#file, { force: true });
  }
}
