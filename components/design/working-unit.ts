import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';

/** The unit of the working scale: "mg", or "ln mg" on the log scale. */
export function workingUnit({ scale, unit }: Pick<Design, 'scale' | 'unit'>): string {
  return scale === 'log' ? `ln ${unitText(unit)}` : unitText(unit);
}
