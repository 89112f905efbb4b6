'use client';

import dynamic from 'next/dynamic';
import { useId, useState } from 'react';
import { StaticTable } from '../tables/static-table';
import type { Column, Row } from '../tables/columns';
import { buttonClass } from '../ui/button';
import { SkeletonFigure } from '../ui/skeleton';
import type { ChartSpec } from './chart-spec';

const ChartCanvas = dynamic(() => import('./chart-canvas'), {
  ssr: false,
  loading: () => <SkeletonFigure />,
});

/** What every chart takes beside its data. */
export interface ChartFigureProps {
  /** The finding in one sentence, not the name of the variables. */
  title: string;
  /** The chart in words, for whoever does not see it. */
  description: string;
  spec: ChartSpec;
  /** The figures behind the chart. */
  columns: readonly Column[];
  rows: readonly Row[];
  /** One line below: the source, the interval's level, what is left out. */
  note?: string;
}

/** A chart with its finding as the title, its text alternative, and its figures behind a button. */
export function ChartFigure({ title, description, spec, columns, rows, note }: ChartFigureProps) {
  const [asTable, setAsTable] = useState(false);
  const tableId = useId();
  return (
    <figure className="min-w-0 break-inside-avoid">
      <figcaption className="mb-2 flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1">
        <span className="max-w-prose font-semibold">{title}</span>
        <button
          type="button"
          aria-expanded={asTable}
          aria-controls={tableId}
          onClick={() => setAsTable(!asTable)}
          className={buttonClass('quiet', true)}
        >
          {asTable ? 'Hide the table' : 'Show as table'}
        </button>
      </figcaption>
      <div className="relative h-72 w-full print:h-64">
        <ChartCanvas spec={spec} description={description} />
      </div>
      {note ? <p className="mt-1 text-xs text-ink-soft">{note}</p> : null}
      <div id={tableId} hidden={!asTable} className="mt-3 print:block">
        <StaticTable caption={title} columns={columns} rows={rows} />
      </div>
    </figure>
  );
}
