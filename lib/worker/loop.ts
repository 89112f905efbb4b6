import { log } from '../log';

const LONGEST_PAUSE_MS = 15_000;

/** A pause that an ending worker cuts short. */
export function pause(milliseconds: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    if (signal.aborted) return resolve();
    const done = (): void => {
      clearTimeout(timer);
      signal.removeEventListener('abort', done);
      resolve();
    };
    const timer = setTimeout(done, milliseconds);
    signal.addEventListener('abort', done);
  });
}

/**
 * Does a step again and again until the signal ends it; the step at work is finished first. An error (a database
 * that is away) is logged and tried again after a pause that grows.
 * @param name says in the log which loop it is
 * @param step does one piece of work and returns how many milliseconds to wait before the next
 */
export async function repeat(name: string, step: () => Promise<number>, signal: AbortSignal): Promise<void> {
  let failures = 0;
  while (!signal.aborted) {
    let wait: number;
    try {
      wait = await step();
      failures = 0;
    } catch (error) {
      failures += 1;
      wait = Math.min(LONGEST_PAUSE_MS, 500 * 2 ** Math.min(failures, 10));
      log().warn({ loop: name, error, failures }, 'worker loop failed and is tried again');
    }
    if (wait > 0) await pause(wait, signal);
  }
}
