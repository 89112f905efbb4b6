'use client';

import {
  columnFilteringFeature,
  columnVisibilityFeature,
  createFilteredRowModel,
  createSortedRowModel,
  globalFilteringFeature,
  rowSortingFeature,
  tableFeatures,
  useTable,
  type ColumnDef,
  type SortingState,
} from '@tanstack/react-table';
import { useMemo } from 'react';
import { compareCells, textOfCell, type Column, type Row } from './columns';

const features = tableFeatures({
  columnFilteringFeature,
  globalFilteringFeature,
  rowSortingFeature,
  columnVisibilityFeature,
  filteredRowModel: createFilteredRowModel(),
  sortedRowModel: createSortedRowModel(),
});

/** How a table is ordered at first. */
export interface InitialSort<Key extends string = string> {
  key: Key;
  descending?: boolean;
}

/** The state of a table over plain columns and rows: sorted, searched, with columns to choose from. */
export function useDataTable({
  columns,
  rows,
  initialSort,
  zone,
}: {
  columns: readonly Column[];
  rows: readonly Row[];
  initialSort?: InitialSort;
  zone: string;
}) {
  const definitions = useMemo(
    () =>
      columns.map((column): ColumnDef<typeof features, Row, unknown> => ({
        id: column.key,
        accessorFn: (row) => row.values[column.key] ?? undefined,
        header: column.header,
        enableSorting: !column.acts,
        enableGlobalFilter: !column.acts,
        enableHiding: !column.acts && !column.rowHeader,
        sortUndefined: 'last',
        sortDescFirst: false,
        sortFn: (a, b) => compareCells(column, a.original.values[column.key], b.original.values[column.key]),
      })),
    [columns],
  );
  const initial = useMemo(() => {
    const sorting: SortingState = initialSort
      ? [{ id: initialSort.key, desc: initialSort.descending ?? false }]
      : [];
    const columnVisibility = Object.fromEntries(
      columns.filter(({ hiddenAtFirst }) => hiddenAtFirst).map(({ key }) => [key, false]),
    );
    return { sorting, columnVisibility };
  }, [columns, initialSort]);
  const byKey = useMemo(
    () => new Map<string, Column>(columns.map((column) => [column.key, column])),
    [columns],
  );

  const table = useTable({
    features,
    columns: definitions,
    data: rows,
    initialState: initial,
    getRowId: (row) => row.id,
    getColumnCanGlobalFilter: (column) => !byKey.get(column.id)?.acts,
    globalFilterFn: (row, columnId, wanted) => {
      const column = byKey.get(columnId);
      if (!column) return false;
      const text = textOfCell(column, row.original.values[column.key], zone);
      return text.toLocaleLowerCase().includes(String(wanted).trim().toLocaleLowerCase());
    },
  });
  return { table, byKey };
}
