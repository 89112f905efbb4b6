import { formatTime, wallClock } from '../ui/format-time';

const DAY = 86_400_000;
const MINUTE = 60_000;
const LOCAL = /^\d{4,6}-\d{2}-\d{2}T\d{2}:\d{2}$/;

/**
 * What a wall-clock text means in a zone: one instant; two, in the hour the clocks are put back over; none, in the hour
 * they are put forward over; or no time at all.
 */
export type ZonedReading =
  | { readonly kind: 'one'; readonly at: string }
  | { readonly kind: 'two'; readonly earlier: string; readonly later: string }
  | { readonly kind: 'none' }
  | { readonly kind: 'unreadable' };

const two = (value: number) => String(value).padStart(2, '0');

/** The wall clock of a zone at an instant, to the minute, as a date-and-time control holds it: `2027-03-14T09:22`. */
export function localText(at: string | Date, zone: string): string {
  const clock = wallClock(at, zone);
  const day = `${String(clock.year).padStart(4, '0')}-${two(clock.month)}-${two(clock.day)}`;
  return `${day}T${two(clock.hour)}:${two(clock.minute)}`;
}

/** A zone's offset from UTC at an instant, in milliseconds. */
function offsetAt(instant: number, zone: string): number {
  const [, sign = '+', hours = '0', minutes = '0'] =
    /^([+-])(\d+):(\d+)/.exec(wallClock(new Date(instant), zone).offset) ?? [];
  return (sign === '-' ? -1 : 1) * (Number(hours) * 60 + Number(minutes)) * MINUTE;
}

/** Whether a text has the form of a wall-clock time rather than of an instant. */
export function isLocalText(text: string): boolean {
  return LOCAL.test(text);
}

/**
 * Reads a wall-clock text of a zone.
 * @param text `YYYY-MM-DDTHH:MM`, the year from 2000 to 2199
 * @param zone an IANA zone, such as `Europe/Vienna`
 * @throws RangeError when the zone is unknown
 */
export function readZonedTime(text: string, zone: string): ZonedReading {
  const asUtc = isLocalText(text) ? Date.parse(`${text}Z`) : Number.NaN;
  const year = Number(text.split('-')[0]);
  if (!Number.isFinite(asUtc) || year < 2000 || year > 2199) return { kind: 'unreadable' };
  // An offset is at most 14 hours, so a day before and after lie on both sides of any change of the clocks that matters.
  const offsets = new Set([asUtc - DAY, asUtc, asUtc + DAY].map((instant) => offsetAt(instant, zone)));
  const found = [...offsets]
    .map((offset) => new Date(asUtc - offset))
    .filter((instant) => localText(instant, zone) === text)
    .map((instant) => instant.toISOString())
    .sort();
  const [earlier, later] = found;
  if (earlier === undefined) return { kind: 'none' };
  return later === undefined ? { kind: 'one', at: earlier } : { kind: 'two', earlier, later };
}

/** Why a wall-clock text stands for no single instant, as a sentence; null for an instant or an empty text. */
export function zonedTimeProblem(text: string, zone: string): string | null {
  if (text === '' || !isLocalText(text)) return null;
  const reading = readZonedTime(text, zone);
  const [day = '', time = ''] = text.split('T');
  switch (reading.kind) {
    case 'one':
      return null;
    case 'two':
      return `The clocks were put back, so ${time} came twice that night. Say which of the two.`;
    case 'none':
      return `The clocks were put forward over this hour: there was no ${time} on ${formatTime(`${day}T12:00:00Z`, 'UTC', 'day')} in ${zone}. Check the time.`;
    case 'unreadable':
      return 'The year is not between 2000 and 2199. Check the date.';
  }
}

/** An instant cut to its minute. */
export function startOfMinute(milliseconds: number): string {
  return new Date(Math.floor(milliseconds / MINUTE) * MINUTE).toISOString();
}

/**
 * The instant meant by a minute that was entered, where something known happened within that very minute and before it:
 * the dose was released at 09:22:41, and "09:22" was entered for the dosing. Any other instant is left as it is.
 * @param notBefore the known instant, or undefined
 */
export function notBeforeWithinMinute(at: string, notBefore: string | undefined): string {
  if (notBefore === undefined || at >= notBefore) return at;
  return startOfMinute(Date.parse(notBefore)) === at ? new Date(notBefore).toISOString() : at;
}
