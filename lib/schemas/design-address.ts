import { z } from 'zod';
import { RULE_NAMES } from '@/lib/design/rules/registry';
import { DESIGN_LIMITS } from './design-limits';

const list = z.preprocess(
  (value) => (value === undefined ? [] : Array.isArray(value) ? value.slice(0, 50) : [value]),
  z.array(z.unknown()).transform((values) => RULE_NAMES.filter((name) => values.includes(name))),
);

/**
 * What the address of a design page may say: the version shown and the rules compared, in the order they are offered. An
 * address is typed by anyone, so what cannot be read is left out instead of refused.
 */
export const designAddressSchema = z.object({
  version: z.coerce.number().int().min(1).max(DESIGN_LIMITS.versions).optional().catch(undefined),
  compare: list,
});

export type DesignAddress = z.output<typeof designAddressSchema>;
