/** Failed attempts in a row, and when the last of them was (milliseconds since 1970). */
export interface Failures {
  readonly count: number;
  readonly lastAt: number;
}

/** The failures that bear on one attempt to prove an identity. */
export interface FailureCounts {
  /** With this address from this client, since the last success of the two. */
  readonly pair: Failures;
  /** With this address from anywhere, since its last success. */
  readonly address: Failures;
  /** From this client with any address, within the last hour. */
  readonly client: Failures;
  /** Whether this address has succeeded from this client lately. */
  readonly clientIsKnown: boolean;
}

export const LONGEST_PAUSE_MS = 15 * 60_000;
const FIRST_PAUSE_MS = 1_000;

/** Failures of each kind that cost no waiting. A client may be a whole hospital behind one address. */
export const FREE_FAILURES = { pair: 5, address: 20, client: 30 } as const;

/**
 * How long to wait after the last of a number of failures in a row: nothing for the first `free`, then one second,
 * doubled with each further one, at most 15 minutes.
 * @returns milliseconds
 */
export function pauseAfter(count: number, free: number): number {
  if (count < free) return 0;
  return Math.min(LONGEST_PAUSE_MS, FIRST_PAUSE_MS * 2 ** Math.min(count - free, 30));
}

/**
 * The earliest time of the next attempt; one that is not after now means at once. A stranger who keeps failing with
 * somebody's address cannot keep that person out: a client from which the person has succeeded lately answers for its
 * own failures with that address only.
 */
export function nextAttemptAt({ pair, address, client, clientIsKnown }: FailureCounts): number {
  const after = (failures: Failures, free: number): number =>
    failures.count < free ? 0 : failures.lastAt + pauseAfter(failures.count, free);
  const ofPair = after(pair, FREE_FAILURES.pair);
  if (clientIsKnown) return ofPair;
  return Math.max(ofPair, after(address, FREE_FAILURES.address), after(client, FREE_FAILURES.client));
}

/** A waiting time in words, rounded up: "40 seconds", "3 minutes". */
export function waitInWords(milliseconds: number): string {
  const seconds = Math.max(1, Math.ceil(milliseconds / 1000));
  const [number, unit] = seconds < 60 ? [seconds, 'second'] : [Math.ceil(seconds / 60), 'minute'];
  return `${number} ${unit}${number === 1 ? '' : 's'}`;
}
