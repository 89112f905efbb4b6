/**
 * The time of a command, read after the lock: never before the last link of the chain.
 * @param clock the server's clock, in milliseconds since 1970
 * @param offset how far a test installation's clock stands before it, in milliseconds; 0 elsewhere
 */
export function commandTime(clock: number, offset: number, chainTime: Date | null): string {
  return new Date(Math.max(clock + Number(offset), chainTime?.getTime() ?? 0)).toISOString();
}
