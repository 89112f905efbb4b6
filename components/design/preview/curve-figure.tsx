import { StaticTable } from '@/components/tables/static-table';
import type { BelievedCurve } from '@/lib/design/advice';
import { doseText } from '@/lib/design/dose-text';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';
import { CURVE_BOX, drawCurve, type CurveDrawing } from './curve-drawing';
import { computedDoseWithUnit, probabilityText } from './computed-text';

const PROBABILITIES = [0, 0.25, 0.5, 0.75, 1];

function finding(design: Design, drawing: CurveDrawing): string {
  const start = drawing.marks.find(({ isStart }) => isStart);
  const target = computedDoseWithUnit(drawing.targetDose, design);
  const where = drawing.targetX === null ? `at ${target}, outside the doses of the design` : `at ${target}`;
  return `On this belief the target ${design.target} is reached ${where}; at the starting dose ${doseText(design, design.startingDose)} the probability is ${probabilityText(start?.probability ?? NaN)}.`;
}

/** The believed curve over the doses: target, starting dose, levels. Drawn as SVG, its figures in a table below. */
export function CurveFigure({ design, curve }: { design: Design; curve: BelievedCurve }) {
  const drawing = drawCurve(design, curve);
  const { width, height, left, right, top, bottom } = CURVE_BOX;
  const unit = unitText(design.unit);
  const sentence = finding(design, drawing);
  const axisTitle = `Dose, ${unit}${design.scale === 'log' ? ' (log scale)' : ''}`;
  return (
    <figure className="min-w-0 break-inside-avoid">
      <figcaption className="mb-1.5 max-w-prose font-semibold">{sentence}</figcaption>
      <svg
        viewBox={`0 0 ${width} ${height}`}
        role="img"
        aria-label={`Believed probability of “${design.response.present}” by dose. ${sentence}`}
        className="block w-full max-w-120"
      >
        <g className="fill-ink-soft stroke-none text-[12px]">
          {PROBABILITIES.map((probability) => {
            const y = top + (1 - probability) * (height - top - bottom);
            return (
              <g key={probability}>
                <path d={`M ${left} ${y} H ${width - right}`} className="stroke-line" />
                <text x={left - 7} y={y + 4} textAnchor="end">
                  {probability}
                </text>
              </g>
            );
          })}
          {drawing.marks.map((mark) => (
            <g key={mark.text}>
              <path
                d={`M ${mark.x} ${height - bottom} v 4`}
                className={mark.isStart ? 'stroke-ink' : 'stroke-ink-soft'}
              />
              {mark.isNamed ? (
                <text
                  x={mark.x}
                  y={height - bottom + 17}
                  textAnchor="middle"
                  className={mark.isStart ? 'fill-ink font-bold' : ''}
                >
                  {mark.text}
                </text>
              ) : null}
            </g>
          ))}
          <text x={(left + width - right) / 2} y={height - 6} textAnchor="middle">
            {axisTitle}
          </text>
        </g>
        <path
          d={`M ${left} ${drawing.targetY} H ${width - right}`}
          className="stroke-water"
          strokeWidth={1.5}
        />
        <text
          x={width - right}
          y={drawing.targetY - 5}
          textAnchor="end"
          className="fill-water-deep text-[12px] font-semibold"
        >
          target {design.target}
        </text>
        {drawing.targetX === null ? null : (
          <path
            d={`M ${drawing.targetX} ${drawing.targetY} V ${height - bottom}`}
            className="stroke-water"
            strokeWidth={1.5}
            strokeDasharray="4 3"
          />
        )}
        <path d={drawing.path} className="fill-none stroke-ink" strokeWidth={2} />
        {drawing.marks
          .filter((mark) => mark.isLevel || mark.isStart)
          .map((mark) =>
            mark.isStart ? (
              <rect
                key={mark.text}
                x={mark.x - 5}
                y={mark.y - 5}
                width={10}
                height={10}
                className="fill-ink stroke-paper"
              />
            ) : (
              <circle
                key={mark.text}
                cx={mark.x}
                cy={mark.y}
                r={4}
                className="fill-paper stroke-ink"
                strokeWidth={1.75}
              />
            ),
          )}
      </svg>
      <p className="text-xs text-ink-soft">
        Square: starting dose.{design.doses.kind === 'levels' ? ' Rings: the other levels.' : ''} Dashed: the
        believed target dose.
      </p>
      <details className="mt-1 text-sm">
        <summary className="text-water underline underline-offset-3">Show as table</summary>
        <StaticTable
          caption={`Believed probability of “${design.response.present}”`}
          columns={[
            { key: 'dose', header: 'Dose', unit, rowHeader: true, end: true },
            { key: 'probability', header: 'Probability', end: true },
          ]}
          rows={drawing.marks.map((mark) => ({
            id: mark.text,
            values: { dose: mark.text, probability: probabilityText(mark.probability) },
          }))}
        />
      </details>
    </figure>
  );
}
