import type { ReactNode } from 'react';
import { StateChip } from '../ui/chip';
import { AlignedNumber } from '../ui/dose';
import { TimeInZone } from '../ui/time-in-zone';
import { textOfCell, type CellValue, type Column } from './columns';

/** What stands in a cell: the content given, or the value in the manner of its column; a dash where there is none. */
export function CellContent({
  column,
  value,
  content,
  decimals,
  zone,
}: {
  column: Column;
  value: CellValue;
  content?: ReactNode;
  decimals: number;
  zone: string;
}) {
  if (content !== undefined && content !== null) return content;
  if (value === null || value === undefined || value === '') return <span className="text-ink-soft">–</span>;
  switch (column.kind) {
    case 'number':
      return <AlignedNumber value={String(value)} decimals={decimals} />;
    case 'state':
      return <StateChip state={String(value)} />;
    case 'time':
      return <TimeInZone at={String(value)} zone={zone} />;
    case 'day':
      return <TimeInZone at={String(value)} zone={zone} precision="day" />;
    case 'code':
      return <span className="font-mono text-[0.88em]">{String(value)}</span>;
    default:
      return textOfCell(column, value, zone);
  }
}

/** The side of a column: numbers and results to the right, with room before what follows. */
function sideClass({ kind, end }: Column): string {
  return kind === 'number' || end ? 'pr-6 pl-3 text-right' : 'pr-3 text-left';
}

/** The header's class: small, soft, on the ink rule; numbers to the right. */
export function headerClass(column: Column): string {
  return `border-b border-ink bg-inherit py-1 align-bottom text-xs font-semibold text-ink-soft last:pr-0 ${sideClass(column)}`;
}

/** A cell's class; stacked tables show it on a phone with its header before it. */
export function cellClass(column: Column, stacked: boolean): string {
  const phone = stacked
    ? 'max-md:border-0 max-md:px-0 max-md:py-0.5 max-md:text-left max-md:data-header:before:mr-1 max-md:data-header:before:text-xs max-md:data-header:before:text-ink-soft max-md:data-header:before:content-[attr(data-header)]'
    : '';
  return `border-b border-line py-1.75 align-top font-normal last:pr-0 ${sideClass(column)} ${
    column.strong ? 'font-semibold' : ''
  } ${phone}`;
}

/** A row's class; stacked tables set it as two columns on a phone. */
export function rowClass(marked: boolean | undefined, stacked: boolean): string {
  return `${marked ? 'bg-water-wash' : ''} ${
    stacked
      ? 'max-md:grid max-md:grid-cols-2 max-md:gap-x-3 max-md:border-b max-md:border-line max-md:py-2'
      : ''
  }`;
}
