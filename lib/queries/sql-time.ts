/** An instant as a DATETIME(3) literal in UTC: a Date given to a raw statement would lose its milliseconds. */
export function sqlTime(milliseconds: number): string {
  return new Date(milliseconds).toISOString().replace('T', ' ').slice(0, 23);
}
