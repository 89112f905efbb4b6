import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';
import { COMPARISON_BOX, drawComparison, type ComparedCourse, type MarkShape } from './comparison-drawing';

/** Colour and dash of the courses in order; the mark and the table say the same. */
const LINES = [
  { stroke: 'stroke-water', fill: 'fill-water', dash: undefined },
  { stroke: 'stroke-ochre', fill: 'fill-ochre', dash: '7 3' },
  { stroke: 'stroke-brick', fill: 'fill-brick', dash: '2 3' },
  { stroke: 'stroke-moss', fill: 'fill-moss', dash: '10 3 2 3' },
  { stroke: 'stroke-water-deep', fill: 'fill-water-deep', dash: '4 2' },
  { stroke: 'stroke-ink-soft', fill: 'fill-ink-soft', dash: '1 2' },
] as const;

const SHAPES: Readonly<Record<MarkShape, string>> = {
  square: 'M -4.5 -4.5 H 4.5 V 4.5 H -4.5 Z',
  circle: 'M -5 0 A 5 5 0 1 0 5 0 A 5 5 0 1 0 -5 0 Z',
  triangle: 'M 0 -5.5 L 5.5 4.5 H -5.5 Z',
  diamond: 'M 0 -6 L 6 0 L 0 6 L -6 0 Z',
  cross: 'M -5 -2 H -2 V -5 H 2 V -2 H 5 V 2 H 2 V 5 H -2 V 2 H -5 Z',
  ring: 'M -5 0 A 5 5 0 1 0 5 0 A 5 5 0 1 0 -5 0 Z M -2.5 0 A 2.5 2.5 0 1 1 2.5 0 A 2.5 2.5 0 1 1 -2.5 0 Z',
};

/** What each rule would have recommended, as flights of steps beside the doses released. */
export function ComparisonFigure({
  design,
  courses,
  title,
}: {
  design: Pick<Design, 'doses' | 'scale' | 'doseNotation' | 'unit'>;
  courses: readonly ComparedCourse[];
  /** The finding in one sentence. */
  title: string;
}) {
  const drawing = drawComparison(design, courses);
  const { left, height, bottom } = COMPARISON_BOX;
  const { width } = drawing;
  const rules = drawing.courses.filter(({ isReleased }) => !isReleased);
  const line = (label: string) => LINES[rules.findIndex((course) => course.label === label) % LINES.length];
  const axis = `Dose, ${unitText(design.unit)}${design.scale === 'log' ? ' (log scale)' : ''}`;
  return (
    <figure className="min-w-0 break-inside-avoid">
      <figcaption className="mb-2 max-w-prose font-semibold">{title}</figcaption>
      <div className="frame-scroll" tabIndex={0} role="group" aria-label="Chart of the comparison">
        <svg
          viewBox={`0 0 ${width} ${height}`}
          width={width}
          height={height}
          role="img"
          aria-label={`Recommended dose by cohort under each rule, beside the released doses. ${title} The figures stand in the table below.`}
          className="block max-w-none"
        >
          <g className="fill-ink-soft text-[12px]">
            {drawing.ticks.map((tick) => (
              <g key={tick.text}>
                <path d={`M ${left} ${tick.y} H ${width}`} className="stroke-line" />
                {tick.isNamed ? (
                  <text x={left - 8} y={tick.y + 4} textAnchor="end">
                    {tick.text}
                  </text>
                ) : null}
              </g>
            ))}
            {drawing.cohorts.map((cohort) => (
              <text key={cohort.number} x={cohort.x} y={height - bottom + 18} textAnchor="middle">
                {cohort.number === 1 ? 'cohort 1' : cohort.number}
              </text>
            ))}
            <text x={left} y={height - 6}>
              {axis}, by cohort
            </text>
          </g>
          {drawing.courses.map((course) =>
            course.isReleased ? (
              <path
                key={course.label}
                d={course.path}
                className="fill-none stroke-line"
                strokeWidth={12}
                strokeLinejoin="round"
              />
            ) : null,
          )}
          {rules.map((course) => (
            <g key={course.label}>
              <path
                d={course.path}
                className={`fill-none ${line(course.label)?.stroke ?? ''}`}
                strokeWidth={2}
                strokeDasharray={line(course.label)?.dash}
              />
              {course.points.map((point) => (
                <path
                  key={point.cohort}
                  d={SHAPES[course.mark]}
                  transform={`translate(${point.x} ${point.y})`}
                  className={`${line(course.label)?.fill ?? ''} stroke-paper`}
                  fillRule="evenodd"
                />
              ))}
            </g>
          ))}
        </svg>
      </div>
      <ul className="mt-1 flex flex-wrap gap-x-5 gap-y-1 text-sm">
        {rules.map((course) => (
          <li key={course.label} className="flex items-center gap-2">
            <svg viewBox="0 0 34 14" width={34} height={14} aria-hidden>
              <path
                d="M 0 7 H 34"
                className={line(course.label)?.stroke}
                strokeWidth={2}
                strokeDasharray={line(course.label)?.dash}
              />
              <path
                d={SHAPES[course.mark]}
                transform="translate(17 7)"
                className={line(course.label)?.fill}
                fillRule="evenodd"
              />
            </svg>
            {course.label}
          </li>
        ))}
        <li className="flex items-center gap-2">
          <svg viewBox="0 0 34 14" width={34} height={14} aria-hidden>
            <path d="M 0 7 H 34" className="stroke-line" strokeWidth={12} />
          </svg>
          released
        </li>
      </ul>
    </figure>
  );
}
