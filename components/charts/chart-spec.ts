/** The tokens a chart may use; the words in its key and table say the same as the colour. */
export type ChartTone = 'ink' | 'ink-soft' | 'water' | 'water-deep' | 'ochre' | 'brick' | 'moss';

/** A point of a series; `low` and `high` are drawn as a whisker. */
export interface ChartPoint {
  x: number;
  y: number;
  low?: number;
  high?: number;
}

/** A series of points, told apart by its mark and dash as well as by its tone. */
export interface ChartSeries {
  label: string;
  points: readonly ChartPoint[];
  tone?: ChartTone;
  /** Joins the points; false shows the points alone. */
  line?: boolean;
  /** Holds each value until the next point, as counts do. */
  stepped?: boolean;
  dashed?: boolean;
  /** none for long lines. */
  mark?: 'circle' | 'square' | 'triangle' | 'cross' | 'none';
  /** Shades the room between `low` and `high` instead of drawing whiskers. */
  band?: boolean;
}

/** An axis: its title carries the unit. */
export interface ChartAxis {
  title: string;
  scale?: 'linear' | 'log' | 'time';
  minimum?: number;
  maximum?: number;
  /** The only values named on the axis, such as the dose levels. */
  ticks?: readonly number[];
  /** Names the values as powers of ten. */
  powersOfTen?: boolean;
  /** Digits after the point of the names. */
  decimals?: number;
}

/** A straight line across, such as the target; its label is written on it. */
export interface ChartRule {
  at: number;
  label: string;
  across?: 'x' | 'y';
  tone?: ChartTone;
}

/** A chart as plain data: a server component makes it, the browser draws it. */
export type ChartSpec =
  | {
      kind: 'points';
      x: ChartAxis;
      y: ChartAxis;
      series: readonly ChartSeries[];
      rules?: readonly ChartRule[];
    }
  | {
      kind: 'bars';
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
    };
