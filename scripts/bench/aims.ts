import { RECOMMENDATION_LIMIT } from './design';

/** What the figures are held against. A bench fails on none of them: it prints which are missed. */
export const AIMS = {
  /** SQL statements of one page, the reader's session included. */
  statements: 6,
  /** Script a page without charts loads, gzip, in kB of 1000 bytes. */
  scriptKilobytes: 160,
  /** The 95th percentile of a page's time over that of the bare page. */
  ratio: 3,
  /** One recommendation with its trace, milliseconds. */
  recommendationMilliseconds: RECOMMENDATION_LIMIT,
} as const;

/** The words beside a figure. */
export const inWords = (isWithin: boolean): string => (isWithin ? 'within aim' : 'beyond aim');

/** Some times in milliseconds, summed up. */
export interface Times {
  readonly samples: number;
  readonly p50: number;
  readonly p95: number;
}

/** The value that a share of the samples does not exceed (nearest rank). Throws without samples. */
export function quantile(samples: readonly number[], share: number): number {
  const sorted = [...samples].sort((a, b) => a - b);
  const value = sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)];
  if (value === undefined) throw new Error('Nothing was measured.');
  return value;
}

export function timesOf(samples: readonly number[]): Times {
  return { samples: samples.length, p50: quantile(samples, 0.5), p95: quantile(samples, 0.95) };
}

/** Prints rows under their headings, numbers to the right. */
export function printTable(headings: readonly string[], rows: readonly (readonly string[])[]): void {
  const widths = headings.map((heading, column) =>
    Math.max(heading.length, ...rows.map((row) => row[column]?.length ?? 0)),
  );
  const isNumeric = headings.map((_, column) => rows.every((row) => /^[-–\d]/.test(row[column] || '–')));
  const line = (cells: readonly string[]) =>
    cells
      .map((cell, column) => {
        const width = widths[column] ?? 0;
        return isNumeric[column] ? cell.padStart(width) : cell.padEnd(width);
      })
      .join('  ')
      .trimEnd();
  console.log(line(headings));
  console.log(widths.map((width) => '─'.repeat(width)).join('  '));
  for (const row of rows) console.log(line(row));
}
