import 'server-only';
import { touchSession } from '@/lib/commands/end-session';
import { IDLE_MS } from '@/lib/policy/session-times';
import { sessionStateSchema } from '@/lib/schemas/account';
import { readerRoute } from './route';

/** When the session ends if nothing more is asked for. Asking does not prolong it. */
export const sessionStateRoute = readerRoute({
  response: sessionStateSchema,
  permits: 'own-account',
  handle: async ({ reader }) => ({ endsAt: reader.sessionEndsAt, now: new Date().toISOString() }),
});

/** The person says that they are still there: the idle time begins anew. */
export const keepSessionRoute = readerRoute({
  response: sessionStateSchema,
  permits: 'own-account',
  handle: async ({ reader }) => {
    const now = Date.now();
    await touchSession(reader.sessionId, () => now);
    const endsAt = Math.min(Date.parse(reader.sessionExpiresAt), now + IDLE_MS);
    return { endsAt: new Date(endsAt).toISOString(), now: new Date(now).toISOString() };
  },
});
