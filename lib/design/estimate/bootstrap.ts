import { openStream } from '../random/streams';
import { isotonicEstimate, isotonicFit } from './isotonic';
import type { DoseRow } from './rows';

/** Draws of a bootstrap interval. */
export const BOOTSTRAP_DRAWS = 2000;
/** Seed of a bootstrap interval where none is given. */
export const BOOTSTRAP_SEED = 1;

/** One end of a bootstrap interval: null when not bounded there. */
export interface BootstrapInterval {
  readonly lower: number | null;
  readonly upper: number | null;
  /** Share of draws whose curve lies wholly above the target, kept at the lowest dose; and wholly below, at the highest. */
  readonly shareAtLowest: number;
  readonly shareAtHighest: number;
  readonly draws: number;
  readonly seed: number;
}

/**
 * Type-7 sample quantile: linear interpolation between order statistics at 1 + (N − 1)q.
 *
 * @param sorted ascending values, at least one. @param q in [0, 1].
 * Source: Hyndman & Fan (1996, Amer. Statist. 50:361-365), definition 7.
 */
export function sampleQuantile(sorted: ArrayLike<number>, q: number): number {
  const position = (sorted.length - 1) * q;
  const below = Math.floor(position);
  const low = sorted[below] as number;
  const share = position - below;
  return share === 0 ? low : low + share * ((sorted[below + 1] as number) - low);
}

/**
 * Parametric bootstrap interval of the dose at Γ by isotonic regression: with the numbers of subjects fixed, responses are
 * drawn from the isotonic fit, doses ascending, subject by subject (a response iff U ≤ fitted p), and each draw is estimated
 * like the data. Draws outside the range of probabilities stay at their end dose; an end with more than α/2 of them is not
 * bounded.
 *
 * @param rows one row per dose, ascending, whole n > 0. @param target Γ. @param level two-sided, in (0, 1).
 * @param options centred isotonic regression or plain; the seed, a 32-bit integer; the number of draws.
 * @returns null when every fitted probability is 0 or 1, where all draws would equal the data.
 */
export function bootstrapInterval(
  rows: readonly DoseRow[],
  target: number,
  level: number,
  options: { centred?: boolean; seed?: number; draws?: number } = {},
): BootstrapInterval | null {
  const { centred = false, seed = BOOTSTRAP_SEED, draws = BOOTSTRAP_DRAWS } = options;
  const { p } = isotonicFit(rows);
  if (p.every((value) => value === 0 || value === 1)) return null;
  const stream = openStream(seed, 0);
  const estimates = new Float64Array(draws);
  let atLowest = 0;
  let atHighest = 0;
  for (let draw = 0; draw < draws; draw++) {
    const drawn = rows.map(({ x, n }, index) => {
      let y = 0;
      for (let subject = 0; subject < n; subject++) if (stream.uniform() <= (p[index] as number)) y++;
      return { x, n, y };
    });
    const { status, estimate } = isotonicEstimate(drawn, target, centred);
    if (status === 'below-range') atLowest++;
    if (status === 'above-range') atHighest++;
    estimates[draw] = estimate;
  }
  estimates.sort();
  const tail = (1 - level) / 2;
  const shareAtLowest = atLowest / draws;
  const shareAtHighest = atHighest / draws;
  return {
    lower: shareAtLowest > tail + 1e-12 ? null : sampleQuantile(estimates, tail),
    upper: shareAtHighest > tail + 1e-12 ? null : sampleQuantile(estimates, 1 - tail),
    shareAtLowest,
    shareAtHighest,
    draws,
    seed,
  };
}
