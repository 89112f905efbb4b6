import { z } from 'zod';
import { credentialsSchema } from './trial-inputs';

/** Address and password, as the sign-in page sends them. */
export const signInSchema = z.strictObject(credentialsSchema);

/** Where to go after signing in: an address of this installation, or Today for anything else. */
export function nextAddress(text: unknown): string {
  if (typeof text !== 'string' || text.length > 1000) return '/today';
  if (!/^\/(?![/\\])[\x21-\x7e]*$/.test(text) || text.includes('\\')) return '/today';
  return /^\/(sign-in|sign-out|api)(\/|\?|$)/.test(text) || text === '/' ? '/today' : text;
}
