import type { ReactNode } from 'react';
import { formatTime } from '../ui/format-time';
import { wordOfState } from '../ui/chip';
import { decimalsOf } from '../ui/dose';

/** What a cell holds for sorting, searching and exporting. Times are ISO 8601 in UTC, exact decimals are text. */
export type CellValue = string | number | boolean | null | undefined;

/**
 * How a column is shown: text; number (right-aligned on the point); time, day (in the reader's zone);
 * state (a chip); code (monospaced).
 */
export type ColumnKind = 'text' | 'number' | 'time' | 'day' | 'state' | 'code';

/** A column: plain data, so that a server component can hand it to a table in the browser. */
export interface Column<Key extends string = string> {
  key: Key;
  header: string;
  kind?: ColumnKind;
  /** Stands behind the header, and behind the header's name in an export. */
  unit?: string;
  /** Digits after the point every number of the column is lined up to; found from the rows when left out. */
  decimals?: number;
  /** The cells name their rows (read out with every other cell of the row). */
  rowHeader?: boolean;
  /** Shown in bold: the figure one came for. */
  strong?: boolean;
  /** Set to the right, for results that are not all numbers; numbers always are. */
  end?: boolean;
  /** Left out at first, to be had from the choice of columns. */
  hiddenAtFirst?: boolean;
  /** Sets a column apart that holds links or buttons only: not sorted, searched or exported. */
  acts?: boolean;
}

/** A row: the values its columns stand for, and what is shown instead of the value where that is more than text. */
export interface Row<Key extends string = string> {
  id: string;
  values: Partial<Record<Key, CellValue>>;
  content?: Partial<Record<Key, ReactNode>>;
  /** The row that acted, that is under review, that is yours: set on water-wash. */
  marked?: boolean;
}

/** The header with its unit, as read and exported: "Dose, mg". */
export function headerText({ header, unit }: Column): string {
  return unit ? `${header}, ${unit}` : header;
}

/** A value as words, for searching and exporting; times in the reader's zone. */
export function textOfCell(column: Column, value: CellValue, zone: string): string {
  if (value === null || value === undefined || value === '') return '';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (column.kind === 'state') return wordOfState(String(value));
  if (column.kind === 'time') return formatTime(String(value), zone, 'minute');
  if (column.kind === 'day') return formatTime(String(value), zone, 'day');
  return String(value);
}

/** Orders two values of a column: numbers by size, everything else as people count ("Site 2" before "Site 10"). */
export function compareCells(column: Column, a: CellValue, b: CellValue): number {
  if (column.kind === 'number') return Number(a) - Number(b);
  if (column.kind === 'time' || column.kind === 'day') return Date.parse(String(a)) - Date.parse(String(b));
  return String(a).localeCompare(String(b), 'en', { numeric: true, sensitivity: 'base' });
}

/** Digits after the point that line up a column of numbers, at most ten. */
export function decimalsOfColumn<Key extends string>(column: Column<Key>, rows: readonly Row<Key>[]): number {
  if (column.kind !== 'number') return 0;
  if (column.decimals !== undefined) return column.decimals;
  const digits = rows.map(({ values }) => decimalsOf(String(values[column.key] ?? '')));
  return Math.min(10, Math.max(0, ...digits));
}
