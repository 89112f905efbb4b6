'use client';

import type { ReactNode } from 'react';
import { buttonClass } from '../ui/button';
import { CellContent, cellClass, headerClass, rowClass } from './cell';
import { decimalsOfColumn, headerText, type Column, type Row } from './columns';
import { toCsv } from './csv';
import { downloadCsv } from './download';
import { ColumnChoice, PhoneSort, Search } from './table-tools';
import { useDataTable, type InitialSort } from './use-data-table';

interface DataTableProps<Key extends string> {
  /** The table's name for screen readers. */
  caption: string;
  columns: readonly Column<Key>[];
  rows: readonly Row<Key>[];
  initialSort?: InitialSort<Key>;
  /** The reader's IANA zone, for the times. */
  zone?: string;
  /** What the rows are, in the plural: "subjects"; names the search and the count. */
  what?: string;
  /** Without a file name there is no export. */
  csvName?: string;
  /** A last line of the export, such as the caution. */
  csvNote?: string;
  /** Shown without rows. */
  empty?: ReactNode;
  /** Search and choice of columns are left out of short tables. */
  plain?: boolean;
}

/**
 * A dense table one can sort, search, choose columns of, and take away as CSV. Its header stays in view; on a phone
 * each row becomes a small block. Columns and rows are plain data, so a server component can render it.
 */
export function DataTable<Key extends string>({
  caption,
  columns,
  rows,
  initialSort,
  zone = 'UTC',
  what = 'rows',
  csvName,
  csvNote,
  empty,
  plain = false,
}: DataTableProps<Key>) {
  const { table, byKey } = useDataTable({ columns, rows, initialSort, zone });
  const shown = table.getRowModel().rows;
  const decimals = new Map(columns.map((column) => [column.key as string, decimalsOfColumn(column, rows)]));
  if (rows.length === 0) return <>{empty ?? <p className="text-ink-soft">No {what} yet.</p>}</>;

  const search = String(table.state.globalFilter ?? '');
  const visible = table
    .getVisibleLeafColumns()
    .map(({ id }) => byKey.get(id))
    .filter((column) => column !== undefined);
  return (
    <div className="grid gap-2.5">
      <div className="flex flex-wrap items-end gap-x-4 gap-y-2 print:hidden">
        {plain ? null : (
          <Search what={what} value={search} onChange={(text) => table.setGlobalFilter(text)} />
        )}
        <PhoneSort
          columns={columns}
          value={table.state.sorting[0]}
          onChange={(sort) => table.setSorting(sort ? [sort] : [])}
        />
        <p role="status" className="ml-auto self-center text-xs text-ink-soft">
          {shown.length === rows.length ? `${rows.length}` : `${shown.length} of ${rows.length}`} {what}
        </p>
        {plain ? null : (
          <ColumnChoice
            items={table
              .getAllLeafColumns()
              .filter((column) => column.getCanHide())
              .map((column) => ({
                id: column.id,
                label: byKey.get(column.id)?.header ?? column.id,
                shown: column.getIsVisible(),
                toggle: () => column.toggleVisibility(),
              }))}
          />
        )}
        {csvName ? (
          <button
            type="button"
            className={buttonClass('secondary', true)}
            onClick={() =>
              downloadCsv(
                csvName,
                toCsv(
                  visible,
                  shown.map(({ original }) => original),
                  { zone, note: csvNote },
                ),
              )
            }
          >
            Export CSV
          </button>
        ) : null}
      </div>
      <div
        role="region"
        aria-label={caption}
        tabIndex={0}
        className="relative bg-paper md:frame-scroll md:max-h-[75vh] md:overflow-y-auto print:max-h-none print:overflow-visible"
      >
        <table role="table" className="w-full border-separate border-spacing-0">
          <caption className="sr-only">{caption}</caption>
          <thead role="rowgroup" className="max-md:sr-only">
            {table.getHeaderGroups().map((group) => (
              <tr key={group.id} role="row">
                {group.headers.map(({ id, column }) => {
                  const own = byKey.get(column.id);
                  if (!own) return null;
                  const sorted = column.getIsSorted();
                  return (
                    <th
                      key={id}
                      role="columnheader"
                      scope="col"
                      aria-sort={
                        sorted === 'asc' ? 'ascending' : sorted === 'desc' ? 'descending' : undefined
                      }
                      className={`${headerClass(own)} sticky top-0 z-10 bg-paper`}
                    >
                      {column.getCanSort() ? (
                        <button
                          type="button"
                          onClick={column.getToggleSortingHandler()}
                          className="min-h-6 font-semibold hover:text-ink"
                        >
                          {headerText(own)}
                          <span aria-hidden="true" className="inline-block w-4 text-center">
                            {sorted === 'asc' ? '↑' : sorted === 'desc' ? '↓' : ''}
                          </span>
                        </button>
                      ) : (
                        headerText(own)
                      )}
                    </th>
                  );
                })}
              </tr>
            ))}
          </thead>
          <tbody role="rowgroup">
            {shown.map((row) => (
              <tr key={row.id} role="row" className={rowClass(row.original.marked, true)}>
                {visible.map((column) => {
                  const Cell = column.rowHeader ? 'th' : 'td';
                  return (
                    <Cell
                      key={column.key}
                      role={column.rowHeader ? 'rowheader' : 'cell'}
                      scope={column.rowHeader ? 'row' : undefined}
                      data-header={column.rowHeader || column.acts ? undefined : headerText(column)}
                      className={cellClass(column, true)}
                    >
                      <CellContent
                        column={column}
                        value={row.original.values[column.key]}
                        content={row.original.content?.[column.key]}
                        decimals={decimals.get(column.key) ?? 0}
                        zone={zone}
                      />
                    </Cell>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
        {shown.length === 0 ? (
          <p className="py-4 text-ink-soft">
            No {what} match “{search}”.{' '}
            <button
              type="button"
              className="text-water underline underline-offset-3"
              onClick={() => table.setGlobalFilter('')}
            >
              Show all
            </button>
          </p>
        ) : null}
      </div>
    </div>
  );
}
