import { z } from 'zod';
import { TEXT_LIMITS } from './trial-inputs';

/** An address as it is stored, compared and found: trimmed, in Unicode's composed form, in lower case. */
export function normaliseEmail(text: string): string {
  return text.trim().normalize('NFC').toLowerCase();
}

/** An e-mail address a person is to be reached at; comes out normalised. */
export const emailSchema = z
  .string({ error: 'The e-mail address is missing. Enter it.' })
  .max(TEXT_LIMITS.email * 2, { error: 'An e-mail address has at most 254 characters.' })
  .transform(normaliseEmail)
  .pipe(
    z
      .string()
      .min(1, { error: 'The e-mail address is missing. Enter it.' })
      .max(TEXT_LIMITS.email, { error: 'An e-mail address has at most 254 characters.' })
      .pipe(z.email({ error: 'This is not an e-mail address. It looks like name@example.org.' })),
  );
