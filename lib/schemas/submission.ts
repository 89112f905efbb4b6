import { z } from 'zod';

/** The key a form makes once and sends with every attempt, so that the same entry is recorded once (RFC 9562). */
export const submissionKeySchema = z
  .string({ error: 'The form carries no key. Load the page again.' })
  .max(36, { error: 'The form’s key is not one. Load the page again.' })
  .regex(/^[0-9a-f]{8}-[0-9a-f]{4}-[1-8][0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/, {
    error: 'The form’s key is not one. Load the page again.',
  });
