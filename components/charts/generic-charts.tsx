import type { Column, Row } from '../tables/columns';
import { ChartFigure } from './chart-figure';
import type { ChartAxis, ChartRule, ChartSeries, ChartTone } from './chart-spec';

interface Words {
  /** The finding in one sentence. */
  title: string;
  description: string;
  note?: string;
}

/** Lines or points over a numeric axis, with bands or whiskers where points carry `low` and `high`. */
export function LineChart({
  x,
  y,
  series,
  rules,
  ...words
}: Words & { x: ChartAxis; y: ChartAxis; series: readonly ChartSeries[]; rules?: readonly ChartRule[] }) {
  const columns: Column[] = [{ key: 'x', header: x.title, kind: 'number', rowHeader: true }];
  const rows = new Map<number, Row>();
  series.forEach((one, index) => {
    const ends = one.points.some(({ low, high }) => low !== undefined && high !== undefined);
    columns.push({ key: `y${index}`, header: one.label, kind: 'number' });
    if (ends) {
      columns.push({ key: `low${index}`, header: `${one.label}, from`, kind: 'number' });
      columns.push({ key: `high${index}`, header: 'to', kind: 'number' });
    }
    for (const point of one.points) {
      const row = rows.get(point.x) ?? { id: String(point.x), values: { x: point.x } };
      Object.assign(row.values, {
        [`y${index}`]: point.y,
        [`low${index}`]: point.low,
        [`high${index}`]: point.high,
      });
      rows.set(point.x, row);
    }
  });
  return (
    <ChartFigure
      {...words}
      spec={{ kind: 'points', x, y, series, rules }}
      columns={columns}
      rows={[...rows.values()].sort((a, b) => Number(a.values.x) - Number(b.values.x))}
    />
  );
}

/** Bars over named categories, such as the share of trials selecting each level. */
export function BarChart({
  x,
  y,
  series,
  rules,
  stacked,
  ...words
}: Words & {
  x: { title: string; categories: readonly string[] };
  y: ChartAxis;
  series: readonly {
    label: string;
    values: readonly (number | null)[];
    tone?: ChartTone;
    outlined?: boolean;
  }[];
  rules?: readonly ChartRule[];
  stacked?: boolean;
}) {
  return (
    <ChartFigure
      {...words}
      spec={{ kind: 'bars', x, y, series, rules, stacked }}
      columns={[
        { key: 'x', header: x.title, rowHeader: true },
        ...series.map(({ label }, index) => ({ key: `y${index}`, header: label, kind: 'number' as const })),
      ]}
      rows={x.categories.map((category, row) => ({
        id: category,
        values: {
          x: category,
          ...Object.fromEntries(series.map(({ values }, index) => [`y${index}`, values[row] ?? null])),
        },
      }))}
    />
  );
}
