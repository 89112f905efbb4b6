/** A session ends after this long without a request by the person. */
export const IDLE_MS = 30 * 60_000;
/** A session ends this long after signing in, whatever happens. */
export const LONGEST_SESSION_MS = 12 * 3_600_000;
/** The time of the last request is written at most this often. */
export const SEEN_EVERY_MS = 60_000;

/** The times of a stored session. */
export interface SessionTimes {
  readonly lastSeenAt: Date;
  readonly expiresAt: Date;
  readonly endedAt: Date | null;
}

/** Whether a session still counts at a time (milliseconds since 1970). */
export function sessionStands({ lastSeenAt, expiresAt, endedAt }: SessionTimes, now: number): boolean {
  return endedAt === null && now < expiresAt.getTime() && now < lastSeenAt.getTime() + IDLE_MS;
}

/** When the session ends if nothing more is asked for, in milliseconds since 1970. */
export function sessionEndsAt({ lastSeenAt, expiresAt }: SessionTimes): number {
  return Math.min(expiresAt.getTime(), lastSeenAt.getTime() + IDLE_MS);
}

/** Whether the time of the last request is due to be written. */
export function isSeenDue(lastSeenAt: Date, now: number): boolean {
  return now - lastSeenAt.getTime() >= SEEN_EVERY_MS;
}
