import type { ChartConfiguration, ChartDataset, ScaleOptionsByType } from 'chart.js';
import type { AnnotationOptions } from 'chartjs-plugin-annotation';
import { doseNumber } from '@/lib/design/dose-text';
import { formatTime } from '../ui/format-time';
import type { ChartAxis, ChartPoint, ChartRule, ChartSeries, ChartSpec } from './chart-spec';
import type { ChartTokens } from './chart-theme';
import type { WhiskerDataset } from './whiskers';

const pointStyles = {
  circle: 'circle',
  square: 'rect',
  triangle: 'triangle',
  cross: 'crossRot',
  none: false,
} as const;

/** Name of a value on an axis, and in the text that follows the pointer. */
export function axisValue(axis: ChartAxis, value: number): string {
  if (axis.scale === 'time') return formatTime(new Date(value), 'UTC', 'day');
  if (axis.powersOfTen) return doseNumber('powers-of-ten', value.toFixed(10).replace(/\.?0+$/, ''));
  if (axis.decimals !== undefined) return value.toFixed(axis.decimals);
  return String(Number(value.toPrecision(6)));
}

function scaleOf(axis: ChartAxis, tokens: ChartTokens, grid: boolean) {
  return {
    type: axis.scale === 'log' ? ('logarithmic' as const) : ('linear' as const),
    min: axis.minimum,
    max: axis.maximum,
    title: { display: true, text: axis.title, color: tokens['ink-soft'] },
    border: { color: tokens['ink-soft'] },
    grid: { color: tokens.line, display: grid, tickColor: tokens['ink-soft'] },
    ticks: {
      color: tokens['ink-soft'],
      autoSkip: true,
      maxRotation: 0,
      callback: (value: string | number) => axisValue(axis, Number(value)),
    },
    ...(axis.ticks
      ? {
          afterBuildTicks: (scale: { ticks: { value: number }[] }) => {
            scale.ticks = (axis.ticks ?? []).map((value) => ({ value }));
          },
        }
      : {}),
  };
}

function datasetsOf(series: ChartSeries, tokens: ChartTokens): ChartDataset<'line', ChartPoint[]>[] {
  const colour = tokens[series.tone ?? 'ink'];
  const whole: WhiskerDataset = {
    label: series.label,
    data: [...series.points],
    borderColor: colour,
    backgroundColor: colour,
    borderWidth: 2,
    borderDash: series.dashed ? [4, 5] : [],
    showLine: series.line ?? true,
    stepped: series.stepped ? 'after' : false,
    pointStyle: pointStyles[series.mark ?? 'circle'],
    pointRadius: series.mark === 'none' ? 0 : 5,
    pointHoverRadius: series.mark === 'none' ? 4 : 6,
    whiskers: !series.band && series.points.some(({ low }) => low !== undefined),
  };
  if (!series.band) return [whole];
  const edge = (
    pick: (point: ChartPoint) => number,
    fill: false | '+1',
  ): ChartDataset<'line', ChartPoint[]> => ({
    label: '',
    data: series.points.map((point) => ({ x: point.x, y: pick(point) })),
    borderColor: tokens.line,
    borderWidth: 1,
    pointRadius: 0,
    pointHitRadius: 0,
    fill,
    backgroundColor: tokens['water-wash'],
  });
  return [whole, edge(({ low, y }) => low ?? y, '+1'), edge(({ high, y }) => high ?? y, false)];
}

function annotationOf(rule: ChartRule, tokens: ChartTokens): AnnotationOptions<'line'> {
  const colour = tokens[rule.tone ?? 'water'];
  const across = rule.across ?? 'x';
  return {
    type: 'line',
    ...(across === 'x' ? { yMin: rule.at, yMax: rule.at } : { xMin: rule.at, xMax: rule.at }),
    borderColor: colour,
    borderWidth: 2,
    label: {
      display: true,
      content: rule.label,
      position: 'end',
      backgroundColor: tokens.paper,
      color: tokens[rule.tone ?? 'water-deep'],
      font: { size: 12, weight: 600 },
      padding: { x: 4, y: 2 },
      yAdjust: across === 'x' ? -11 : 0,
    },
  };
}

function commonOptions(spec: ChartSpec, tokens: ChartTokens) {
  const shownInKey = spec.series.length > 1;
  return {
    responsive: true,
    maintainAspectRatio: false,
    animation: false as const,
    font: { family: tokens.fontFamily, size: 12 },
    color: tokens.ink,
    plugins: {
      legend: {
        display: shownInKey,
        position: 'bottom' as const,
        align: 'start' as const,
        labels: {
          usePointStyle: true,
          color: tokens.ink,
          filter: ({ text }: { text: string }) => text !== '',
        },
      },
      annotation: { annotations: (spec.rules ?? []).map((rule) => annotationOf(rule, tokens)) },
    },
  };
}

function tooltipColours(tokens: ChartTokens) {
  return {
    backgroundColor: tokens.ink,
    titleColor: tokens.paper,
    bodyColor: tokens.paper,
    cornerRadius: 2,
    displayColors: false,
  };
}

/** The configuration Chart.js draws a chart of points and lines from. */
export function pointsConfig(
  spec: Extract<ChartSpec, { kind: 'points' }>,
  tokens: ChartTokens,
): ChartConfiguration<'line', ChartPoint[]> {
  const common = commonOptions(spec, tokens);
  return {
    type: 'line',
    data: { datasets: spec.series.flatMap((series) => datasetsOf(series, tokens)) },
    options: {
      ...common,
      interaction: { mode: 'nearest', intersect: false },
      scales: {
        x: scaleOf(spec.x, tokens, false) as unknown as ScaleOptionsByType<'linear'>,
        y: scaleOf(spec.y, tokens, true) as unknown as ScaleOptionsByType<'linear'>,
      },
      plugins: {
        ...common.plugins,
        tooltip: {
          ...tooltipColours(tokens),
          filter: ({ dataset }) => dataset.label !== '',
          callbacks: {
            title: ([item]) => (item ? `${spec.x.title}: ${axisValue(spec.x, item.parsed.x ?? 0)}` : ''),
            label: ({ raw, dataset }) => pointInWords(spec.y, dataset.label ?? '', raw as ChartPoint),
          },
        },
      },
    },
  };
}

function pointInWords(axis: ChartAxis, label: string, { y, low, high }: ChartPoint): string {
  const value = `${label}: ${axisValue(axis, y)}`;
  if (low === undefined || high === undefined) return value;
  return `${value}, ${axisValue(axis, low)} to ${axisValue(axis, high)}`;
}

/** The configuration Chart.js draws a chart of bars from. */
export function barsConfig(
  spec: Extract<ChartSpec, { kind: 'bars' }>,
  tokens: ChartTokens,
): ChartConfiguration<'bar', (number | null)[], string> {
  const common = commonOptions(spec, tokens);
  return {
    type: 'bar',
    data: {
      labels: [...spec.x.categories],
      datasets: spec.series.map(({ label, values, tone = 'water', outlined }) => ({
        label,
        data: [...values],
        backgroundColor: outlined ? tokens.paper : tokens[tone],
        borderColor: tokens[tone],
        borderWidth: 2,
        maxBarThickness: 56,
      })),
    },
    options: {
      ...common,
      scales: {
        x: {
          stacked: spec.stacked,
          title: { display: true, text: spec.x.title, color: tokens['ink-soft'] },
          border: { color: tokens['ink-soft'] },
          grid: { display: false },
          ticks: { color: tokens['ink-soft'], maxRotation: 0 },
        },
        y: {
          ...(scaleOf(spec.y, tokens, true) as unknown as ScaleOptionsByType<'linear'>),
          stacked: spec.stacked,
        },
      },
      plugins: {
        ...common.plugins,
        tooltip: {
          ...tooltipColours(tokens),
          callbacks: {
            label: ({ dataset, parsed }) => `${dataset.label}: ${axisValue(spec.y, parsed.y ?? 0)}`,
          },
        },
      },
    },
  };
}
