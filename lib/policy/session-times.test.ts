import { describe, expect, it } from 'vitest';
import { IDLE_MS, isSeenDue, LONGEST_SESSION_MS, sessionEndsAt, sessionStands } from './session-times';

const START = Date.UTC(2027, 2, 1, 8);
const times = (lastSeen: number, ended: number | null = null) => ({
  lastSeenAt: new Date(lastSeen),
  expiresAt: new Date(START + LONGEST_SESSION_MS),
  endedAt: ended === null ? null : new Date(ended),
});

describe('a session', () => {
  it('stands for 30 minutes after its last use, and not a millisecond more', () => {
    expect(IDLE_MS).toBe(1_800_000);
    expect(sessionStands(times(START), START + IDLE_MS - 1)).toBe(true);
    expect(sessionStands(times(START), START + IDLE_MS)).toBe(false);
  });

  it('stands for 12 hours at the most, however much it is used', () => {
    expect(LONGEST_SESSION_MS).toBe(43_200_000);
    const end = START + LONGEST_SESSION_MS;
    expect(sessionStands(times(end - 1_000), end - 1)).toBe(true);
    expect(sessionStands(times(end - 1_000), end)).toBe(false);
  });

  it('does not stand once it was ended', () => {
    expect(sessionStands(times(START, START + 1), START + 2)).toBe(false);
  });

  it('ends at the earlier of the two times', () => {
    expect(sessionEndsAt(times(START))).toBe(START + IDLE_MS);
    const late = START + LONGEST_SESSION_MS - 60_000;
    expect(sessionEndsAt(times(late))).toBe(START + LONGEST_SESSION_MS);
  });

  it('has its last use written once a minute', () => {
    expect(isSeenDue(new Date(START), START + 59_999)).toBe(false);
    expect(isSeenDue(new Date(START), START + 60_000)).toBe(true);
  });
});
