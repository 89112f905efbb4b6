import { z } from 'zod';

/**
 * What a cohort's page asks for while it is open: a digest of all that its reader is shown, which differs as soon as any
 * of that has changed.
 */
export const cohortRevisionSchema = z.strictObject({
  number: z.number().int().min(1),
  revision: z.string().regex(/^[0-9a-f]{64}$/),
});

export type CohortRevision = z.output<typeof cohortRevisionSchema>;
