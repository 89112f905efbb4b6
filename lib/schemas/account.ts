import { z } from 'zod';
import { newPasswordSchema } from './password';
import { credentialsSchema } from './trial-inputs';

/** What a person changes about their own account. */
export const changePasswordSchema = z.strictObject({
  currentPassword: credentialsSchema.password,
  newPassword: newPasswordSchema,
});

/** The digest that names a session. */
export const endSessionSchema = z.strictObject({
  sessionId: z.string().regex(/^[0-9a-f]{64}$/, { error: 'This session does not exist.' }),
});

/** What a page learns of its session without prolonging it. */
export const sessionStateSchema = z.strictObject({
  /** ISO 8601, UTC: when the session ends if nothing more is asked for. */
  endsAt: z.iso.datetime(),
  /** The server's clock, so that a wrong clock of the reader's machine does not matter. */
  now: z.iso.datetime(),
});
export type SessionState = z.infer<typeof sessionStateSchema>;
