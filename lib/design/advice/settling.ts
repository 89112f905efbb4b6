import type { Dose } from '@/lib/schemas/dose';
import type { DoseSet } from '../dose-set';

/** A level the rule of virtual observations can settle on. */
export interface SettlingLevel {
  readonly index: number;
  readonly dose: Dose;
  /** M at the level. */
  readonly probability: number;
  /** Whether it is the lowest or highest level, which has one neighbour only. */
  readonly end: boolean;
}

/**
 * Levels on which virtual observations can settle: v with (Γ − M(v))/b below half the gap above it and (M(v) − Γ)/b below
 * half the gap below it (at the ends only the side with a neighbour counts). Several may qualify, and chance leaves them
 * early. The other rules that carry the assigned value settle on no inner level.
 *
 * @param doses the levels. @param probability M at a dose of level i. @param target Γ. @param slope b > 0.
 * @param direction 1 when response rises with dose, −1 when it falls (the gaps above and below then change places).
 * Source: fixed points of Cheung & Elkind's (2010) recursion.
 */
export function settlingLevels(
  doses: DoseSet,
  probability: (index: number) => number,
  target: number,
  slope: number,
  direction: 1 | -1 = 1,
): SettlingLevel[] {
  const levels: SettlingLevel[] = [];
  for (let index = 0; index < doses.count; index++) {
    const x = doses.working(index);
    const above = index < doses.count - 1 ? doses.working(index + 1) - x : Infinity;
    const below = index > 0 ? x - doses.working(index - 1) : Infinity;
    const p = probability(index);
    const drift = (direction * (target - p)) / slope;
    if (drift < above / 2 && -drift < below / 2) {
      levels.push({
        index,
        dose: doses.dose(index),
        probability: p,
        end: index === 0 || index === doses.count - 1,
      });
    }
  }
  return levels;
}
