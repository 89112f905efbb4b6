import { formatTime, type TimePrecision } from './format-time';

/**
 * A moment, in words and for machines.
 * @param at an instant as ISO 8601 text in UTC (or a Date)
 * @param zone the IANA zone of the reader or the site; UTC by default
 */
export function TimeInZone({
  at,
  zone = 'UTC',
  precision = 'minute',
}: {
  at: string | Date;
  zone?: string;
  precision?: TimePrecision;
}) {
  const iso = typeof at === 'string' ? at : at.toISOString();
  return (
    <time dateTime={iso} title={zone === 'UTC' ? undefined : formatTime(at, 'UTC', 'second')}>
      {formatTime(at, zone, precision)}
    </time>
  );
}
