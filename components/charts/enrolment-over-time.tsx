import { formatTime } from '../ui/format-time';
import { ChartFigure } from './chart-figure';

/** A count at a moment; `at` is an instant, ISO 8601 in UTC. */
export interface CountAt {
  at: string;
  count: number;
}

/**
 * Subjects enrolled over time, against the plan where there is one.
 * @param enrolled the number enrolled so far, at each moment it changed, in order
 * @param plan the number planned, at the ends of each stretch of the plan
 */
export function EnrolmentOverTime({
  enrolled,
  plan,
  zone = 'UTC',
}: {
  enrolled: readonly CountAt[];
  plan?: readonly CountAt[];
  zone?: string;
}) {
  const points = (counts: readonly CountAt[]) =>
    counts.map(({ at, count }) => ({ x: Date.parse(at), y: count }));
  const last = enrolled.at(-1);
  const planned = plan?.at(-1);
  const title = last
    ? `${last.count} subjects enrolled by ${formatTime(last.at, zone, 'day')}${planned ? `, of ${planned.count} planned` : ''}`
    : 'No subject enrolled yet';
  return (
    <ChartFigure
      title={title}
      description={`Subjects enrolled over time. ${enrolled
        .map(({ at, count }) => `${formatTime(at, zone, 'day')}: ${count}`)
        .join('; ')}.`}
      spec={{
        kind: 'points',
        x: { title: 'Date', scale: 'time' },
        y: { title: 'Subjects enrolled', minimum: 0, decimals: 0 },
        series: [
          {
            label: 'Enrolled',
            points: points(enrolled),
            stepped: true,
            mark: enrolled.length > 40 ? 'none' : 'circle',
          },
          ...(plan
            ? [
                {
                  label: 'Plan',
                  points: points(plan),
                  dashed: true,
                  tone: 'water' as const,
                  mark: 'none' as const,
                },
              ]
            : []),
        ],
      }}
      columns={[
        { key: 'at', header: 'Date', kind: 'day', rowHeader: true },
        { key: 'enrolled', header: 'Enrolled', kind: 'number' },
        ...(plan ? [{ key: 'planned', header: 'Planned', kind: 'number' as const }] : []),
      ]}
      rows={rowsOf(enrolled, plan ?? [])}
    />
  );
}

/** One row a moment, of the count enrolled and the count planned, in order of time. */
function rowsOf(enrolled: readonly CountAt[], plan: readonly CountAt[]) {
  const rows = new Map<string, { at: string; enrolled?: number; planned?: number }>();
  for (const { at, count } of enrolled) rows.set(at, { ...rows.get(at), at, enrolled: count });
  for (const { at, count } of plan) rows.set(at, { ...rows.get(at), at, planned: count });
  return [...rows.values()]
    .sort((a, b) => Date.parse(a.at) - Date.parse(b.at))
    .map((values) => ({ id: values.at, values }));
}
