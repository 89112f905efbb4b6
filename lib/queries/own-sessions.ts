import { Op } from 'sequelize';
import { models } from '@/lib/db/connection';
import { IDLE_MS, sessionStands } from '@/lib/policy/session-times';

/** A session of the reader's own, as the account page lists it. */
export interface OwnSession {
  readonly id: string;
  readonly createdAt: string;
  readonly lastSeenAt: string;
}

/** The standing sessions of a person, the last used one first. `now` is in milliseconds since 1970. */
export async function ownSessions(personId: string, now: number): Promise<OwnSession[]> {
  const sessions = await models().Session.findAll({
    where: { personId, endedAt: null, lastSeenAt: { [Op.gt]: new Date(now - IDLE_MS) } },
    order: [['lastSeenAt', 'DESC']],
    limit: 100,
  });
  return sessions
    .filter((session) => sessionStands(session, now))
    .map(({ id, createdAt, lastSeenAt }) => ({
      id,
      createdAt: createdAt.toISOString(),
      lastSeenAt: lastSeenAt.toISOString(),
    }));
}
