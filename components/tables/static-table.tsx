import type { ReactNode } from 'react';
import { CellContent, cellClass, headerClass, rowClass } from './cell';
import { decimalsOfColumn, headerText, type Column, type Row } from './columns';

/**
 * A table that is only read: no script is sent for it.
 * @param caption the table's name; seen only where `captionShown`
 * @param stacked on a phone each row becomes a small block (for rows of records); otherwise the table scrolls in its frame
 * @param headerHidden hides the header from sight, for a list of steps or of terms
 * @param empty what stands there without rows
 */
export function StaticTable<Key extends string>({
  caption,
  captionShown = false,
  columns,
  rows,
  stacked = false,
  headerHidden = false,
  zone = 'UTC',
  empty,
}: {
  caption: string;
  captionShown?: boolean;
  columns: readonly Column<Key>[];
  rows: readonly Row<Key>[];
  stacked?: boolean;
  headerHidden?: boolean;
  zone?: string;
  empty?: ReactNode;
}) {
  if (rows.length === 0 && empty) return empty;
  const decimals = columns.map((column) => decimalsOfColumn(column, rows));
  return (
    <div
      {...(stacked ? {} : { className: 'frame-scroll', role: 'group', 'aria-label': caption, tabIndex: 0 })}
    >
      <table role="table" className="w-full border-collapse">
        <caption className={captionShown ? 'pb-2 text-left font-semibold' : 'sr-only'}>{caption}</caption>
        <thead role="rowgroup" className={headerHidden ? 'sr-only' : stacked ? 'max-md:sr-only' : undefined}>
          <tr role="row">
            {columns.map((column) => (
              <th key={column.key} role="columnheader" scope="col" className={headerClass(column)}>
                {headerText(column)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody role="rowgroup">
          {rows.map((row) => (
            <tr key={row.id} role="row" className={rowClass(row.marked, stacked)}>
              {columns.map((column, index) => {
                const Cell = column.rowHeader ? 'th' : 'td';
                return (
                  <Cell
                    key={column.key}
                    role={column.rowHeader ? 'rowheader' : 'cell'}
                    scope={column.rowHeader ? 'row' : undefined}
                    data-header={column.rowHeader || column.acts ? undefined : headerText(column)}
                    className={cellClass(column, stacked)}
                  >
                    <CellContent
                      column={column}
                      value={row.values[column.key]}
                      content={row.content?.[column.key]}
                      decimals={decimals[index] ?? 0}
                      zone={zone}
                    />
                  </Cell>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
