import { headerText, textOfCell, type CellValue, type Column, type Row } from './columns';

/** Marks at the start of a cell that a spreadsheet would take for a formula. */
const FORMULA_START = /^[=+\-@\t\r]/;

/**
 * A text as one field of a CSV file (RFC 4180): quoted where needed, and with an apostrophe before anything that a
 * spreadsheet would run as a formula.
 */
export function csvField(text: string): string {
  const safe = FORMULA_START.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

function csvCell(column: Column, value: CellValue, zone: string): string {
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : '';
  if (column.kind === 'time' || column.kind === 'day') return csvField(String(value ?? ''));
  return csvField(textOfCell(column, value, zone));
}

/**
 * Rows as a CSV file: a header line, then one line a row, ended by CR LF. Times stay ISO 8601 in UTC.
 * Numbers are written as they are; texts that a spreadsheet would run are made harmless.
 * @param note a last line set apart by an empty one, such as the caution of an export
 */
export function toCsv<Key extends string>(
  columns: readonly Column<Key>[],
  rows: readonly Row<Key>[],
  { zone = 'UTC', note }: { zone?: string; note?: string } = {},
): string {
  const exported = columns.filter(({ acts }) => !acts);
  const lines = [
    exported.map((column) => csvField(headerText(column))).join(','),
    ...rows.map(({ values }) =>
      exported.map((column) => csvCell(column, values[column.key], zone)).join(','),
    ),
  ];
  if (note) lines.push('', csvField(note));
  return lines.map((line) => `${line}\r\n`).join('');
}
