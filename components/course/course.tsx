import { useId } from 'react';
import { StaticTable } from '../tables/static-table';
import type { Row } from '../tables/columns';
import { OutcomeLegend } from '../ui/outcome-mark';
import { wordOfState } from '../ui/chip';
import type { CourseData, CourseShapes, CourseText } from './course-data';
import { CourseFrame } from './course-frame';
import { courseShapes, pathThrough, round } from './course-shapes';
import { courseInWords, estimateInWords, outcomesInWords, printed } from './course-words';

function Text({ label, className }: { label: CourseText; className: string }) {
  return (
    <text x={round(label.x)} y={round(label.y)} textAnchor={label.anchor} fontSize="12" className={className}>
      {label.text}
    </text>
  );
}

/** Whether a course needs more room than a page has, and keeps its own size in a frame that scrolls. */
const isWide = ({ width }: CourseShapes) => width > 900;

/** The doses' names once more, standing still at the left of a frame that scrolls, at the drawing's own size. */
function StandingDoses({ shapes, ground }: { shapes: CourseShapes; ground: 'stone' | 'paper' }) {
  const scale = isWide(shapes) ? 1 : 0.8;
  return (
    <div
      aria-hidden="true"
      className={`sticky left-0 z-10 w-0 flex-none print:hidden ${isWide(shapes) ? '' : 'md:hidden'}`}
    >
      <svg
        viewBox={`0 0 ${shapes.left} ${shapes.height}`}
        width={round(shapes.left * scale)}
        height={round(shapes.height * scale)}
        className="block max-w-none font-sans"
      >
        <rect
          width={shapes.left - 1}
          height={shapes.height}
          className={ground === 'stone' ? 'fill-stone' : 'fill-paper'}
        />
        {shapes.doseLabels.map((label) => (
          <Text key={label.y} label={label} className="fill-ink-soft" />
        ))}
      </svg>
    </div>
  );
}

/** The drawing alone. */
function CourseDrawing({ data, shapes }: { data: CourseData; shapes: CourseShapes }) {
  const id = useId();
  const { water } = shapes;
  const wide = isWide(shapes);
  return (
    <svg
      viewBox={`0 0 ${shapes.width} ${shapes.height}`}
      width={shapes.width}
      height={shapes.height}
      role="img"
      aria-labelledby={`${id}-title ${id}-desc`}
      className={`block flex-none font-sans ${
        wide ? 'max-w-none print:h-auto print:w-full' : 'h-auto w-180 max-w-none md:w-full md:max-w-265'
      }`}
    >
      <title id={`${id}-title`}>Course of doses</title>
      <desc id={`${id}-desc`}>{courseInWords(data)}</desc>
      {water?.band ? (
        <rect
          x={water.x1}
          y={round(water.band.y)}
          width={water.x2 - water.x1}
          height={round(water.band.height)}
          className="fill-water-wash"
        />
      ) : null}
      {shapes.grid.map(({ x1, x2, y }) => (
        <path key={y} d={`M${x1} ${round(y)}H${x2}`} className="fill-none stroke-line" />
      ))}
      {water ? (
        <path
          d={`M${water.x1} ${round(water.y)}H${water.x2}`}
          strokeWidth="2.5"
          className="fill-none stroke-water"
        />
      ) : null}
      <path d={pathThrough(shapes.released)} strokeWidth="3" className="fill-none stroke-ink" />
      <path
        d={pathThrough(shapes.proposed)}
        strokeWidth="3"
        strokeDasharray="3 6"
        className="fill-none stroke-ink"
      />
      {shapes.marks.map(({ x, y, radius, outcome }) => (
        <g key={`${x} ${y}`} strokeWidth="2" className="stroke-ink">
          <circle
            cx={round(x)}
            cy={round(y)}
            r={radius}
            strokeWidth={outcome === 'present' ? 0 : 2}
            strokeDasharray={outcome === 'pending' ? '2 2' : undefined}
            className={outcome === 'present' ? 'fill-ink' : 'fill-paper'}
          />
          {outcome === 'not-evaluable' ? (
            <path
              d={`M${round(x - 3.5)} ${round(y - 3.5)}l7 7m0 -7l-7 7`}
              strokeWidth="1.5"
              className="fill-none"
            />
          ) : null}
        </g>
      ))}
      {water ? <Text label={water.label} className="fill-water-deep font-semibold" /> : null}
      <g className={wide ? 'hidden print:inline' : 'hidden md:inline print:inline'}>
        {shapes.doseLabels.map((label) => (
          <Text key={label.y} label={label} className="fill-ink-soft" />
        ))}
      </g>
      {shapes.cohortLabels.map((label) => (
        <Text key={label.x} label={label} className={label.strong ? 'fill-ink font-bold' : 'fill-ink-soft'} />
      ))}
    </svg>
  );
}

function rowsOf(data: CourseData): Row<'cohort' | 'dose' | 'state' | 'outcomes'>[] {
  const rows = data.cohorts.map((cohort) => ({
    id: String(cohort.number),
    values: {
      cohort: cohort.number,
      dose: printed(data, cohort.dose),
      state: wordOfState(cohort.state),
      outcomes: outcomesInWords(cohort, data.labels),
    },
  }));
  if (!data.proposed) return rows;
  const { number, dose } = data.proposed;
  const state = 'Proposed, not signed';
  return [
    ...rows,
    { id: 'proposed', values: { cohort: number, dose: printed(data, dose), state, outcomes: '' } },
  ];
}

/**
 * The course of doses: the same drawing in the trial's header, the report and the packet, from data already cut to what
 * the reader may see. With the marks' key and a table for whoever does not read drawings.
 * @param ground what it stands on: stone in the trial's header, paper in a sheet
 */
export function Course({
  data,
  table = true,
  ground = 'stone',
}: {
  data: CourseData;
  table?: boolean;
  ground?: 'stone' | 'paper';
}) {
  const shapes = courseShapes(data);
  const outcomes = data.cohorts.flatMap(({ marks }) => marks ?? []);
  const marked = data.cohorts.some(({ marks }) => marks !== undefined);
  const also = (['not-evaluable', 'pending'] as const).filter((outcome) => outcomes.includes(outcome));
  const estimate = estimateInWords(data);
  return (
    <figure className="min-w-0">
      <CourseFrame at={shapes.currentX / shapes.width}>
        <StandingDoses shapes={shapes} ground={ground} />
        <CourseDrawing data={data} shapes={shapes} />
      </CourseFrame>
      <figcaption className="mt-1 flex flex-wrap items-start gap-x-6 gap-y-1 md:pl-12">
        {marked && data.labels ? <OutcomeLegend labels={data.labels} also={also} /> : null}
        {table && data.cohorts.length > 0 ? (
          <details className="text-xs text-ink-soft open:w-full print:hidden">
            <summary className="min-h-6 underline underline-offset-3">Show as table</summary>
            <div className="mt-2 max-w-prose text-ink">
              <StaticTable
                caption={`Course of doses${estimate ? `; ${estimate}` : ''}`}
                columns={[
                  { key: 'cohort', header: 'Cohort', rowHeader: true },
                  {
                    key: 'dose',
                    header: 'Dose',
                    unit: data.unit,
                    ...(data.notation === 'powers-of-ten' ? {} : { kind: 'number' as const }),
                  },
                  { key: 'state', header: 'State' },
                  ...(marked ? [{ key: 'outcomes' as const, header: 'Outcomes' }] : []),
                ]}
                rows={rowsOf(data)}
              />
            </div>
          </details>
        ) : null}
      </figcaption>
    </figure>
  );
}
