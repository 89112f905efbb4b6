import { Op } from 'sequelize';
import { LONGEST_SESSION_MS } from '@/lib/policy/session-times';
import { newToken, tokenDigest } from '@/lib/auth/tokens';
import { models } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { RefusedError } from '@/lib/errors';
import type { ProvenIdentity } from './prove-identity';

/** Ended sessions are kept this long for the account page, then deleted at the person's next sign-in. */
const KEPT_MS = 30 * 86_400_000;

/**
 * Begins a session of a person whose identity was just proven.
 * @returns the session's secret value, for the cookie; only its digest is stored
 * @throws RefusedError when the password was changed or the account disabled since it was proven
 */
export async function startSession(
  identity: ProvenIdentity,
  clock: () => number = Date.now,
): Promise<string> {
  const token = newToken();
  await inTransaction(
    async (transaction) => {
      const person = await models().Person.findByPk(identity.personId, { lock: transaction.LOCK.UPDATE });
      if (person?.state !== 'active' || person.passwordHash !== identity.passwordHash) {
        throw new RefusedError({
          code: 'wrong-credentials',
          message: 'The account was changed while you were signing in. Try again.',
        });
      }
      const now = clock();
      const { Session } = models();
      await Session.destroy({
        where: { personId: person.id, expiresAt: { [Op.lt]: new Date(now - KEPT_MS) } },
      });
      await Session.create({
        id: tokenDigest(token),
        personId: person.id,
        createdAt: new Date(now),
        lastSeenAt: new Date(now),
        expiresAt: new Date(now + LONGEST_SESSION_MS),
        endedAt: null,
      });
    },
    { repeatable: true },
  );
  return token;
}
