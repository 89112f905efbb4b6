import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FailureCounts, FREE_FAILURES, nextAttemptAt, pauseAfter, waitInWords } from './back-off';

const NONE = { count: 0, lastAt: 0 };
const counts = (some: Partial<FailureCounts>): FailureCounts => ({
  pair: NONE,
  address: NONE,
  client: NONE,
  clientIsKnown: false,
  ...some,
});

describe('the pause after failures in a row', () => {
  // Worked by hand from "one second, doubled with each further failure, at most 15 minutes" (OWASP ASVS 5.0, 6.1.1
  // and 6.3.1 ask for a limit that cannot be used to lock somebody out).
  it.each([
    [0, 0],
    [4, 0],
    [5, 1_000],
    [6, 2_000],
    [7, 4_000],
    [14, 512_000],
    [15, 900_000],
    [500, 900_000],
  ])('after %i failures of which five are free: %i ms', (count, pause) => {
    expect(pauseAfter(count, 5)).toBe(pause);
  });

  it('never gets shorter with a further failure, and never exceeds 15 minutes', () => {
    fc.assert(
      fc.property(fc.nat(1_000_000), fc.nat(100), (count, free) => {
        const pause = pauseAfter(count, free);
        expect(pause).toBeLessThanOrEqual(15 * 60_000);
        expect(pauseAfter(count + 1, free)).toBeGreaterThanOrEqual(pause);
      }),
    );
  });
});

describe('the earliest time of the next attempt', () => {
  it('is at once before the free failures are used up', () => {
    expect(nextAttemptAt(counts({ pair: { count: FREE_FAILURES.pair - 1, lastAt: 1_000 } }))).toBe(0);
  });

  it('counts from the last failure', () => {
    expect(nextAttemptAt(counts({ pair: { count: 6, lastAt: 10_000 } }))).toBe(12_000);
  });

  it('is the latest that address, client or the two together ask for', () => {
    const address = { count: FREE_FAILURES.address + 3, lastAt: 1_000 };
    const client = { count: FREE_FAILURES.client + 1, lastAt: 2_000 };
    expect(nextAttemptAt(counts({ address }))).toBe(9_000);
    expect(nextAttemptAt(counts({ client }))).toBe(4_000);
    expect(nextAttemptAt(counts({ address, client }))).toBe(9_000);
  });

  it('does not let strangers keep a person out at a client they are known at', () => {
    const strangers = { count: 1_000, lastAt: 1_000 };
    expect(nextAttemptAt(counts({ address: strangers, client: strangers, clientIsKnown: true }))).toBe(0);
  });

  it('still limits guessing at a known client', () => {
    expect(nextAttemptAt(counts({ pair: { count: 20, lastAt: 1_000 }, clientIsKnown: true }))).toBe(901_000);
  });
});

describe('a waiting time in words', () => {
  it.each([
    [1, '1 second'],
    [999, '1 second'],
    [1_001, '2 seconds'],
    [59_000, '59 seconds'],
    [60_000, '1 minute'],
    [61_000, '2 minutes'],
    [900_000, '15 minutes'],
  ])('%i ms is %s', (milliseconds, words) => {
    expect(waitInWords(milliseconds)).toBe(words);
  });
});
