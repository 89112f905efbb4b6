import { doseNumber } from '@/lib/design/dose-text';
import { ChartFigure } from './chart-figure';

/** What was seen at one dose. `low` and `high` are the ends of the interval of the response proportion, 0 to 1. */
export interface DoseProportion {
  dose: string;
  present: number;
  evaluable: number;
  low: number;
  high: number;
}

/** The finding: the dose whose observed share lies nearest the target, the lower one of two equally near. */
export function proportionFinding(
  doses: readonly DoseProportion[],
  target: number,
  unit: string,
  response: string,
  notation: 'plain' | 'powers-of-ten' = 'plain',
): string {
  const seen = doses.filter(({ evaluable }) => evaluable > 0);
  const distance = ({ present, evaluable }: DoseProportion) => Math.abs(present / evaluable - target);
  const [first, ...others] = seen;
  if (!first) return `No outcome of ${response} yet`;
  const nearest = others.reduce((best, dose) => (distance(dose) < distance(best) ? dose : best), first);
  return `Observed share of ${response} lies nearest the target ${target} at ${doseNumber(notation, nearest.dose)} ${unit} (${nearest.present} of ${nearest.evaluable})`;
}

/**
 * Response proportion by dose: a point a dose with its interval, the target as a line across.
 * @param response the trial's word for the response ("dose-limiting toxicity")
 * @param level the interval in words ("95 % Wilson intervals")
 * @param notation how the trial prints its doses
 */
export function ProportionByDose({
  doses,
  target,
  unit,
  scale,
  response,
  level,
  notation = 'plain',
}: {
  doses: readonly DoseProportion[];
  target: number;
  unit: string;
  scale: 'linear' | 'log';
  response: string;
  level: string;
  notation?: 'plain' | 'powers-of-ten';
}) {
  const seen = doses.filter(({ evaluable }) => evaluable > 0);
  const values = seen.map(({ dose }) => Number(dose));
  const share = (value: number) => value.toFixed(2);
  const lines = seen.map(
    ({ dose, present, evaluable, low, high }) =>
      `${doseNumber(notation, dose)} ${unit}: ${present} of ${evaluable}, interval ${share(low)} to ${share(high)}`,
  );
  return (
    <ChartFigure
      title={proportionFinding(doses, target, unit, response, notation)}
      description={`Share of subjects with ${response} by dose, target ${target}. ${lines.join('; ')}.`}
      note={level}
      spec={{
        kind: 'points',
        x: {
          title: `Dose, ${unit}`,
          scale,
          ticks: values,
          powersOfTen: notation === 'powers-of-ten',
          ...marginsAround(values, scale),
        },
        y: { title: `Share of subjects with ${response}`, minimum: 0, maximum: 1, decimals: 1 },
        series: [
          {
            label: `Share with ${response}`,
            line: false,
            points: seen.map(({ dose, present, evaluable, low, high }) => ({
              x: Number(dose),
              y: present / evaluable,
              low,
              high,
            })),
          },
        ],
        rules: [{ at: target, label: `target ${target}` }],
      }}
      columns={[
        {
          key: 'dose',
          header: 'Dose',
          unit,
          kind: notation === 'plain' ? 'number' : 'text',
          rowHeader: true,
        },
        { key: 'present', header: response, kind: 'number' },
        { key: 'evaluable', header: 'Evaluable', kind: 'number' },
        { key: 'share', header: 'Share', kind: 'number', strong: true },
        { key: 'low', header: 'Interval from', kind: 'number' },
        { key: 'high', header: 'to', kind: 'number' },
      ]}
      rows={doses.map(({ dose, present, evaluable, low, high }) => ({
        id: dose,
        values: {
          dose: doseNumber(notation, dose),
          present,
          evaluable,
          share: evaluable > 0 ? share(present / evaluable) : null,
          low: evaluable > 0 ? share(low) : null,
          high: evaluable > 0 ? share(high) : null,
        },
      }))}
    />
  );
}

/** The ends of the axis: a little beyond the outermost doses, in the manner of the scale. */
function marginsAround(values: readonly number[], scale: 'linear' | 'log') {
  if (values.length === 0) return {};
  const low = Math.min(...values);
  const high = Math.max(...values);
  if (scale === 'log') return { minimum: low / 1.3, maximum: high * 1.3 };
  const margin = (high - low || Math.abs(high) || 1) * 0.08;
  return { minimum: low - margin, maximum: high + margin };
}
