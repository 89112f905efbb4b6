import type { Chart, ChartDataset, Plugin } from 'chart.js';
import type { ChartPoint } from './chart-spec';

/** A dataset of points with whiskers from `low` to `high`. */
export type WhiskerDataset = ChartDataset<'line', ChartPoint[]> & { whiskers?: boolean };

/** Draws a whisker through every point of a dataset marked `whiskers`: a line from low to high with short ends. */
export const whiskers: Plugin<'line'> = {
  id: 'whiskers',
  beforeDatasetsDraw(chart: Chart<'line'>) {
    const { ctx, scales } = chart;
    const { x: across, y: up } = scales;
    if (!across || !up) return;
    chart.data.datasets.forEach((dataset, index) => {
      if (!(dataset as WhiskerDataset).whiskers || !chart.isDatasetVisible(index)) return;
      ctx.save();
      ctx.strokeStyle = String(dataset.borderColor);
      ctx.lineWidth = 1.5;
      for (const point of dataset.data as unknown as ChartPoint[]) {
        if (point.low === undefined || point.high === undefined) continue;
        const x = across.getPixelForValue(point.x);
        const low = up.getPixelForValue(point.low);
        const high = up.getPixelForValue(point.high);
        ctx.beginPath();
        ctx.moveTo(x, low);
        ctx.lineTo(x, high);
        for (const end of [low, high]) {
          ctx.moveTo(x - 5, end);
          ctx.lineTo(x + 5, end);
        }
        ctx.stroke();
      }
      ctx.restore();
    });
  },
};
