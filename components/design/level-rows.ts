import { subtractDecimals } from '@/lib/design/decimal';
import { doseText } from '@/lib/design/dose-text';
import { toWorking } from '@/lib/design/scale';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';
import { computedText } from './preview/computed-text';

/** A level as its table shows it. */
export interface LevelRow {
  readonly level: number;
  readonly dose: string;
  /** The dose in powers of ten, where the design prints them so. */
  readonly doseShown: string | null;
  /** w(d). */
  readonly working: string;
  /** How far it is above the level below: the fold on the log scale, the step on the linear; null for the lowest. */
  readonly rise: string | null;
}

/** The levels of a design, lowest first; empty for a range. */
export function levelRows(design: Design): LevelRow[] {
  const { doses, scale, doseNotation } = design;
  if (doses.kind !== 'levels') return [];
  return doses.levels.map((dose, index) => {
    const below = doses.levels[index - 1];
    const rise =
      below === undefined
        ? null
        : scale === 'log'
          ? `× ${Number((Number(dose) / Number(below)).toPrecision(4))}`
          : `+ ${subtractDecimals(dose, below)}`;
    return {
      level: index + 1,
      dose,
      doseShown:
        doseNotation === 'plain' ? null : doseText(design, dose).replace(` ${unitText(design.unit)}`, ''),
      working: computedText(toWorking(scale, Number(dose))),
      rise,
    };
  });
}
