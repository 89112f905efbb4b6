/** A person is warned this long before their session ends. */
export const WARN_BEFORE_MS = 2 * 60_000;
const AT_LEAST_MS = 5_000;
const ONCE_WARNED_MS = 15_000;

/**
 * When to ask the server about the session again, in milliseconds from now: when the warning is due; once it was given,
 * every 15 seconds, since another page may have prolonged the session.
 * @param left milliseconds until the session ends
 */
export function untilNextLook(left: number): number {
  if (left > WARN_BEFORE_MS) return Math.max(AT_LEAST_MS, left - WARN_BEFORE_MS);
  return Math.min(ONCE_WARNED_MS, Math.max(AT_LEAST_MS, left));
}
