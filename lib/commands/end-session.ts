import { Op } from 'sequelize';
import { models } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { notFound } from '@/lib/errors';

/** Ends one session; nothing happens when it has ended already. `sessionId` is the digest of its secret value. */
export async function endSession(sessionId: string, clock: () => number = Date.now): Promise<void> {
  await inTransaction(
    () =>
      models().Session.update({ endedAt: new Date(clock()) }, { where: { id: sessionId, endedAt: null } }),
    { repeatable: true },
  );
}

/** Ends a session of a person; somebody else's does not exist for them. */
export async function endOwnSession(
  personId: string,
  sessionId: string,
  clock: () => number = Date.now,
): Promise<void> {
  await inTransaction(
    async () => {
      const { Session } = models();
      const session = await Session.findOne({ where: { id: sessionId, personId } });
      if (session === null) throw notFound('This session');
      if (session.endedAt === null) {
        await Session.update({ endedAt: new Date(clock()) }, { where: { id: sessionId, personId } });
      }
    },
    { repeatable: true },
  );
}

/**
 * Ends every session of a person, at a disabling, a reset or a changed password. In the caller's transaction.
 * @param exceptSessionId a session that stands, the one the person is at
 */
export async function endSessionsOf(personId: string, at: Date, exceptSessionId?: string): Promise<void> {
  await models().Session.update(
    { endedAt: at },
    { where: { personId, endedAt: null, ...(exceptSessionId ? { id: { [Op.ne]: exceptSessionId } } : {}) } },
  );
}

/** Writes when a session was last used, at most once a minute (lib/policy/session-times.ts). */
export async function touchSession(sessionId: string, clock: () => number = Date.now): Promise<void> {
  const now = new Date(clock());
  await inTransaction(
    () =>
      models().Session.update(
        { lastSeenAt: now },
        { where: { id: sessionId, endedAt: null, lastSeenAt: { [Op.lt]: now } } },
      ),
    { repeatable: true },
  );
}
