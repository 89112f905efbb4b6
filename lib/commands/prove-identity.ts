import { nextAttemptAt } from '@/lib/auth/back-off';
import { passwordMatches } from '@/lib/auth/passwords';
import { TooManyAttemptsError } from '@/lib/auth/too-many-attempts';
import { models } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { RefusedError } from '@/lib/errors';
import { sha256 } from '@/lib/hash';
import { signInFailures } from '@/lib/queries/sign-in-failures';
import { normaliseEmail } from '@/lib/schemas/email';

/** A person whose address and password were just proven, and the hash they were proven against. */
export interface ProvenIdentity {
  readonly personId: string;
  /** Compared again inside the transaction, so that a password changed meanwhile proves nothing. */
  readonly passwordHash: string;
}

export interface IdentityClaim {
  readonly email: string;
  readonly password: string;
  readonly purpose: 'sign-in' | 'signature';
  /** The network address the request came from, at most 64 characters. */
  readonly clientAddress: string;
  /** For a signature: the signed-in person; the address of anybody else is refused. */
  readonly expectedPersonId?: string;
  /** The server's clock; a test passes its own. */
  readonly clock?: () => number;
}

const REFUSALS = {
  'sign-in': 'The e-mail address or the password is not right. Check both and try again.',
  signature:
    'The e-mail address or the password is not right, or they are not your own. Nothing was signed; enter your own address and password again.',
} as const;

/**
 * Proves address and password, for signing in and for a signature. Answers alike, and takes alike long, for an unknown
 * address, a wrong password, a person who is disabled or has not accepted the invitation. Every attempt is counted
 * before it is checked, so that many at once are counted too. Not to be called inside a transaction.
 * @throws RefusedError `wrong-credentials`; TooManyAttemptsError with the time of the next attempt
 */
export async function proveIdentity(claim: IdentityClaim): Promise<ProvenIdentity> {
  const clock = claim.clock ?? Date.now;
  const email = normaliseEmail(claim.email);
  const attempt = {
    emailDigest: sha256(email),
    clientAddress: claim.clientAddress.slice(0, 64),
    purpose: claim.purpose,
  };
  const attemptId = await countAttempt(attempt, clock());
  const person = await models().Person.findOne({ where: { email } });
  const matches = await passwordMatches(claim.password, person?.passwordHash ?? null);
  const isRight =
    matches &&
    person?.state === 'active' &&
    normaliseEmail(person.email) === email &&
    (claim.expectedPersonId === undefined || claim.expectedPersonId === person.id);
  if (!isRight || person.passwordHash === null) {
    throw new RefusedError({ code: 'wrong-credentials', message: REFUSALS[claim.purpose] });
  }
  await inTransaction(
    async () => {
      await models().SignInAttempt.destroy({ where: { id: attemptId } });
      await models().SignInAttempt.create({ ...attempt, succeeded: true, attemptedAt: new Date(clock()) });
    },
    { repeatable: true },
  );
  return { personId: person.id, passwordHash: person.passwordHash };
}

type Attempt = Pick<
  InstanceType<ReturnType<typeof models>['SignInAttempt']>,
  'emailDigest' | 'clientAddress' | 'purpose'
>;

/** Refuses an attempt before its time; else logs it as failed until it is known to have succeeded. */
function countAttempt(attempt: Attempt, now: number): Promise<number> {
  return inTransaction(
    async () => {
      const retryAt = nextAttemptAt(await signInFailures(attempt.emailDigest, attempt.clientAddress, now));
      if (retryAt > now) throw new TooManyAttemptsError(retryAt, now);
      const row = await models().SignInAttempt.create({
        ...attempt,
        succeeded: false,
        attemptedAt: new Date(now),
      });
      return row.id;
    },
    { repeatable: true },
  );
}
