import { z } from 'zod';

/** The number of a caught mail, as it stands in an address. */
export const caughtMailIdSchema = z
  .string()
  .regex(/^[1-9]\d{0,14}$/)
  .transform(Number);

/** What the list of caught mails may be asked for; anything else is as if it had not been asked. */
export const caughtMailFilterSchema = z.object({
  to: z.string().min(1).max(254).nullable().catch(null).default(null),
  before: caughtMailIdSchema.nullable().catch(null).default(null),
});

/** The address of the list of caught mails, with its filter. */
export function caughtMailListPath(filter: { to: string | null; before?: number | null }): string {
  const query = new URLSearchParams();
  if (filter.to !== null) query.set('to', filter.to);
  if (filter.before != null) query.set('before', String(filter.before));
  return query.size === 0 ? '/caught-mail' : `/caught-mail?${query}`;
}
