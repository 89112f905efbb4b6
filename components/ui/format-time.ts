const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** day: "4 Mar 2027" · minute: "4 Mar 2027, 09:22 UTC" · second: "4 Mar 2027, 09:22:41 UTC" */
export type TimePrecision = 'day' | 'minute' | 'second';

const formatters = new Map<string, Intl.DateTimeFormat>();

function formatterOf(zone: string): Intl.DateTimeFormat {
  let formatter = formatters.get(zone);
  if (!formatter) {
    formatter = new Intl.DateTimeFormat('en-GB', {
      timeZone: zone,
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: '2-digit',
      minute: '2-digit',
      second: '2-digit',
      hourCycle: 'h23',
      timeZoneName: 'longOffset',
    });
    formatters.set(zone, formatter);
  }
  return formatter;
}

/** The wall clock of a zone at an instant, with its offset from UTC as "+01:00" ("+00:00" for UTC itself). */
export function wallClock(at: string | Date, zone: string) {
  const parts = new Map<string, string>();
  for (const { type, value } of formatterOf(zone).formatToParts(new Date(at))) parts.set(type, value);
  const number = (type: string) => Number(parts.get(type));
  const offset = (parts.get('timeZoneName') ?? '').replace('GMT', '').replace('\u2212', '-') || '+00:00';
  return {
    year: number('year'),
    month: number('month'),
    day: number('day'),
    hour: number('hour'),
    minute: number('minute'),
    second: number('second'),
    offset,
  };
}

const two = (value: number) => String(value).padStart(2, '0');

/** The offset as it stands behind a time: "UTC", "UTC+1", "UTC+5:30". */
function offsetText(offset: string): string {
  if (offset === '+00:00') return 'UTC';
  const [hours = '', minutes = '00'] = offset.split(':');
  const short = hours.replace(/^([+-])0/, '$1').replace('-', '\u2212');
  return `UTC${short}${minutes === '00' ? '' : `:${minutes}`}`;
}

/**
 * An instant in the words of a zone: day, month by name, year, and the offset so that nobody has to guess.
 * @param at an instant, as ISO 8601 text in UTC or a Date
 * @param zone an IANA zone, such as `Europe/Vienna`; `UTC` by default
 * @throws RangeError when `at` is no instant or the zone is unknown
 */
export function formatTime(at: string | Date, zone = 'UTC', precision: TimePrecision = 'minute'): string {
  const clock = wallClock(at, zone);
  const day = `${clock.day} ${MONTHS[clock.month - 1]} ${clock.year}`;
  if (precision === 'day') return day;
  const seconds = precision === 'second' ? `:${two(clock.second)}` : '';
  return `${day}, ${two(clock.hour)}:${two(clock.minute)}${seconds} ${offsetText(clock.offset)}`;
}
