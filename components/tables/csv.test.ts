import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import type { Column, Row } from './columns';
import { compareCells, decimalsOfColumn, textOfCell } from './columns';
import { csvField, toCsv } from './csv';

const columns: Column[] = [
  { key: 'code', header: 'Code', rowHeader: true },
  { key: 'dose', header: 'Dose', unit: 'mg', kind: 'number' },
  { key: 'at', header: 'Changed', kind: 'time' },
  { key: 'state', header: 'State', kind: 'state' },
  { key: 'open', header: 'Open', acts: true },
];
const rows: Row[] = [
  {
    id: '1',
    values: { code: 'WELL-2', dose: '2.50', at: '2027-03-04T09:22:00.000Z', state: 'in-review', open: 'x' },
  },
  { id: '2', values: { code: 'a "b", c', dose: -1.5, at: null, state: undefined } },
];

/** The fields of a CSV text read by the grammar of RFC 4180, section 2. */
function readCsv(text: string): string[][] {
  const lines: string[][] = [[]];
  const field = /(?:"((?:[^"]|"")*)"|([^",\r\n]*))(,|\r\n|$)/gy;
  while (field.lastIndex < text.length) {
    const match = field.exec(text);
    if (!match) throw new Error(`No CSV at ${field.lastIndex}`);
    lines.at(-1)?.push(match[1]?.replaceAll('""', '"') ?? match[2] ?? '');
    if (match[3] === '\r\n') lines.push([]);
  }
  return lines.slice(0, -1);
}

describe('exporting rows', () => {
  it('writes headers with units, exact numbers, times in UTC, words for states, and no column of acts', () => {
    expect(toCsv(columns, rows)).toBe(
      'Code,"Dose, mg",Changed,State\r\n' +
        'WELL-2,2.50,2027-03-04T09:22:00.000Z,In review\r\n' +
        '"a ""b"", c",-1.5,,\r\n',
    );
  });

  it('sets a note apart at the end', () => {
    expect(toCsv(columns, [], { note: 'A calculated suggestion, no order.' })).toBe(
      'Code,"Dose, mg",Changed,State\r\n\r\n"A calculated suggestion, no order."\r\n',
    );
  });

  // The characters are those of OWASP's page on CSV injection.
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\tx', '\rx'])('makes %j harmless', (text) => {
    expect(readCsv(`${csvField(text)}\r\n`)).toEqual([[`'${text}`]]);
  });

  it('gives every text back to a reader of RFC 4180', () => {
    check(
      fc.property(fc.array(fc.string(), { minLength: 1 }), (texts) => {
        const line = `${texts.map(csvField).join(',')}\r\n`;
        expect(readCsv(line)).toEqual([texts.map((text) => (/^[=+\-@\t\r]/.test(text) ? `'${text}` : text))]);
      }),
    );
  });
});

describe('columns', () => {
  it('order numbers by size, codes as people count, times by the clock', () => {
    expect(compareCells({ key: 'a', header: 'a', kind: 'number' }, '9', '10')).toBeLessThan(0);
    expect(compareCells({ key: 'a', header: 'a' }, 'Site 10', 'Site 2')).toBeGreaterThan(0);
    const time: Column = { key: 'a', header: 'a', kind: 'time' };
    expect(compareCells(time, '2027-03-04T09:00:00+02:00', '2027-03-04T08:00:00Z')).toBeLessThan(0);
  });

  it('line up on the longest fraction, or on what they are told', () => {
    const dose: Column = { key: 'dose', header: 'Dose', kind: 'number' };
    expect(
      decimalsOfColumn(dose, [
        { id: '1', values: { dose: '2.5' } },
        { id: '2', values: { dose: '0.125' } },
      ]),
    ).toBe(3);
    expect(decimalsOfColumn({ ...dose, decimals: 1 }, [])).toBe(1);
    expect(decimalsOfColumn(dose, [])).toBe(0);
  });

  it('say values in words, times in the reader’s zone', () => {
    expect(textOfCell({ key: 'a', header: 'a', kind: 'time' }, '2027-03-04T09:22:00Z', 'Europe/Vienna')).toBe(
      '4 Mar 2027, 10:22 UTC+1',
    );
    expect(textOfCell({ key: 'a', header: 'a', kind: 'state' }, 'closed-to-enrolment', 'UTC')).toBe(
      'Closed to enrolment',
    );
    expect(textOfCell({ key: 'a', header: 'a' }, true, 'UTC')).toBe('yes');
  });
});
