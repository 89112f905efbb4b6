import type { Design } from '@/lib/schemas/design';

export type Scale = Design['scale'];

/** w(d): the working scale, d itself or its natural logarithm (−Infinity at 0). */
export function toWorking(scale: Scale, dose: number): number {
  return scale === 'log' ? Math.log(dose) : dose;
}

/** w⁻¹(x): the dose, in its unit, of a value on the working scale. */
export function fromWorking(scale: Scale, x: number): number {
  return scale === 'log' ? Math.exp(x) : x;
}

/** s: +1 when the response rises with dose, −1 when it falls. */
export function signOf(design: Design): 1 | -1 {
  return design.response.direction === 'rising' ? 1 : -1;
}
