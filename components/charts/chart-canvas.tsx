'use client';

import {
  BarController,
  BarElement,
  CategoryScale,
  Chart as ChartJs,
  Filler,
  Legend,
  LinearScale,
  LineController,
  LineElement,
  LogarithmicScale,
  PointElement,
  Tooltip,
} from 'chart.js';
import annotation from 'chartjs-plugin-annotation';
import { useMemo } from 'react';
import { Chart } from 'react-chartjs-2';
import { barsConfig, pointsConfig } from './chart-config';
import type { ChartSpec } from './chart-spec';
import { useChartTokens } from './chart-theme';
import { whiskers } from './whiskers';

ChartJs.register(
  BarController,
  BarElement,
  CategoryScale,
  Filler,
  Legend,
  LinearScale,
  LineController,
  LineElement,
  LogarithmicScale,
  PointElement,
  Tooltip,
  annotation,
  whiskers,
);

/** The canvas of a chart. Loaded by itself, so that pages without charts do not carry Chart.js. */
export default function ChartCanvas({ spec, description }: { spec: ChartSpec; description: string }) {
  const tokens = useChartTokens();
  const drawing = useMemo(() => {
    if (spec.kind === 'bars') {
      const { data, options } = barsConfig(spec, tokens);
      return { type: 'bar' as const, data, options };
    }
    const { data, options } = pointsConfig(spec, tokens);
    return { type: 'line' as const, data, options };
  }, [spec, tokens]);
  const accessible = { role: 'img', 'aria-label': description };
  return drawing.type === 'bar' ? (
    <Chart type="bar" data={drawing.data} options={drawing.options} {...accessible} />
  ) : (
    <Chart type="line" data={drawing.data} options={drawing.options} {...accessible} />
  );
}
