const FORMAT = new Intl.DateTimeFormat('en-GB', {
  timeZone: 'UTC',
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
  hourCycle: 'h23',
});

/** An instant (ISO 8601) as a mail says it, "14 March 2027, 09:22 UTC": a mail does not know its reader's zone. */
export function utcTime(instant: string): string {
  const parts = new Map(FORMAT.formatToParts(new Date(instant)).map(({ type, value }) => [type, value]));
  const part = (type: Intl.DateTimeFormatPartTypes): string => parts.get(type) ?? '';
  return `${part('day')} ${part('month')} ${part('year')}, ${part('hour')}:${part('minute')} UTC`;
}
