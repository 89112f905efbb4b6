import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  localText,
  notBeforeWithinMinute,
  readZonedTime,
  startOfMinute,
  zonedTimeProblem,
} from './zoned-time';

/*
 * Changes of the clocks. Europe: last Sundays of March and October at 01:00 UTC (Directive 2000/84/EC, Articles 2 and 3;
 * from memory). United States: second Sunday of March and first of November at 02:00 local time (Energy Policy Act of
 * 2005, section 110; from memory). Lord Howe Island moves by half an hour (IANA time zone database; from memory).
 */
describe('a wall-clock time of a site', () => {
  it('is one instant on most days', () => {
    expect(readZonedTime('2027-03-14T09:22', 'Europe/Vienna')).toEqual({
      kind: 'one',
      at: '2027-03-14T08:22:00.000Z',
    });
    expect(readZonedTime('2027-07-14T09:22', 'Europe/Vienna')).toEqual({
      kind: 'one',
      at: '2027-07-14T07:22:00.000Z',
    });
    expect(readZonedTime('2027-01-01T00:10', 'Pacific/Kiritimati')).toEqual({
      kind: 'one',
      at: '2026-12-31T10:10:00.000Z',
    });
    expect(readZonedTime('2027-01-01T00:10', 'Asia/Kathmandu')).toEqual({
      kind: 'one',
      at: '2026-12-31T18:25:00.000Z',
    });
  });

  it('does not exist in the hour the clocks are put forward over', () => {
    for (const [text, zone] of [
      ['2027-03-28T02:00', 'Europe/Vienna'],
      ['2027-03-28T02:59', 'Europe/Vienna'],
      ['2027-03-28T01:30', 'Europe/London'],
      ['2027-03-14T02:30', 'America/Chicago'],
      ['2027-10-03T02:15', 'Australia/Lord_Howe'],
    ] as const) {
      expect(readZonedTime(text, zone), `${text} ${zone}`).toEqual({ kind: 'none' });
    }
    expect(zonedTimeProblem('2027-03-28T02:30', 'Europe/Vienna')).toBe(
      'The clocks were put forward over this hour: there was no 02:30 on 28 Mar 2027 in Europe/Vienna. Check the time.',
    );
    expect(readZonedTime('2027-03-28T01:59', 'Europe/Vienna')).toEqual({
      kind: 'one',
      at: '2027-03-28T00:59:00.000Z',
    });
    expect(readZonedTime('2027-03-28T03:00', 'Europe/Vienna')).toEqual({
      kind: 'one',
      at: '2027-03-28T01:00:00.000Z',
    });
  });

  it('is two instants in the hour the clocks are put back over', () => {
    expect(readZonedTime('2027-10-31T02:30', 'Europe/Vienna')).toEqual({
      kind: 'two',
      earlier: '2027-10-31T00:30:00.000Z',
      later: '2027-10-31T01:30:00.000Z',
    });
    expect(readZonedTime('2027-11-07T01:30', 'America/Chicago')).toEqual({
      kind: 'two',
      earlier: '2027-11-07T06:30:00.000Z',
      later: '2027-11-07T07:30:00.000Z',
    });
    expect(readZonedTime('2027-04-04T01:45', 'Australia/Lord_Howe')).toEqual({
      kind: 'two',
      earlier: '2027-04-03T14:45:00.000Z',
      later: '2027-04-03T15:15:00.000Z',
    });
    expect(zonedTimeProblem('2027-10-31T02:30', 'Europe/Vienna')).toBe(
      'The clocks were put back, so 02:30 came twice that night. Say which of the two.',
    );
    expect(readZonedTime('2027-10-31T01:59', 'Europe/Vienna').kind).toBe('one');
    expect(readZonedTime('2027-10-31T03:00', 'Europe/Vienna').kind).toBe('one');
  });

  it('refuses what is no time, and years that are slips', () => {
    for (const text of [
      '',
      'now',
      '2027-02-30T09:00x',
      '2027-13-01T09:00',
      '0202-03-14T09:22',
      '12027-03-14T09:22',
    ]) {
      expect(readZonedTime(text, 'Europe/Vienna'), text).toEqual({ kind: 'unreadable' });
    }
    expect(zonedTimeProblem('0202-03-14T09:22', 'UTC')).toContain('between 2000 and 2199');
    expect(zonedTimeProblem('2027-03-14T08:22:00.000Z', 'UTC')).toBeNull();
  });

  it('leads back to the instant it was written from, in any zone (property)', () => {
    const zones = [
      'UTC',
      'Europe/Vienna',
      'America/St_Johns',
      'Australia/Lord_Howe',
      'Pacific/Apia',
      'Asia/Tehran',
    ];
    fc.assert(
      fc.property(
        fc.integer({ min: Date.UTC(2001, 0, 1), max: Date.UTC(2099, 0, 1) }),
        fc.constantFrom(...zones),
        (milliseconds, zone) => {
          const at = startOfMinute(milliseconds);
          const reading = readZonedTime(localText(at, zone), zone);
          const found =
            reading.kind === 'one'
              ? [reading.at]
              : reading.kind === 'two'
                ? [reading.earlier, reading.later]
                : [];
          expect(found).toContain(at);
        },
      ),
    );
  });
});

describe('a minute that was entered', () => {
  it('is not before what happened within it', () => {
    const released = '2027-03-14T08:22:41.120Z';
    expect(notBeforeWithinMinute('2027-03-14T08:22:00.000Z', released)).toBe(released);
    expect(notBeforeWithinMinute('2027-03-14T08:21:00.000Z', released)).toBe('2027-03-14T08:21:00.000Z');
    expect(notBeforeWithinMinute('2027-03-14T08:23:00.000Z', released)).toBe('2027-03-14T08:23:00.000Z');
    expect(notBeforeWithinMinute('2027-03-14T08:22:00.000Z', undefined)).toBe('2027-03-14T08:22:00.000Z');
  });
});
