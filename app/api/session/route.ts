import { sessionStateRoute, keepSessionRoute } from '@/lib/server/session-route';

/** When the session ends, without prolonging it; and, by POST, that it is in use. */
export { sessionStateRoute as GET, keepSessionRoute as POST };
