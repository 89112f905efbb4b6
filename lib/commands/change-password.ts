import { hashPassword } from '@/lib/auth/passwords';
import { models } from '@/lib/db/connection';
import { RefusedError } from '@/lib/errors';
import { whyGuessable } from '@/lib/schemas/password';
import { runPublicCommand } from './installation/run-installation-command';
import { proveIdentity } from './prove-identity';

export interface PasswordChange {
  readonly personId: string;
  readonly email: string;
  readonly printedName: string;
  /** The session it is done in; it stands, every other one of the person ends. */
  readonly sessionId: string;
  readonly clientAddress: string;
  readonly currentPassword: string;
  readonly newPassword: string;
  readonly clock?: () => number;
}

function refuseField(field: string, message: string): never {
  throw new RefusedError({
    code: 'invalid',
    message: `Not changed. ${message}`,
    fields: { [field]: message },
  });
}

/** The present password is asked for again, with the same back-off as at signing in. */
async function proveCurrent(change: PasswordChange): Promise<string> {
  try {
    const identity = await proveIdentity({
      email: change.email,
      password: change.currentPassword,
      purpose: 'sign-in',
      clientAddress: change.clientAddress,
      expectedPersonId: change.personId,
      clock: change.clock,
    });
    return identity.passwordHash;
  } catch (error) {
    if (error instanceof RefusedError && error.code === 'wrong-credentials') {
      refuseField('currentPassword', 'The present password is not right.');
    }
    throw error;
  }
}

/**
 * Changes a person's own password, as an event of the installation's chain. Their other sessions end.
 * @throws RefusedError with the field concerned; nothing is changed then
 */
export async function changePassword(change: PasswordChange): Promise<void> {
  const { personId, newPassword } = change;
  const why = whyGuessable(newPassword, [change.email, change.printedName]);
  if (why !== null) refuseField('newPassword', why);
  if (newPassword === change.currentPassword) {
    refuseField('newPassword', 'This is the present password. Choose another one.');
  }
  const provenHash = await proveCurrent(change);
  const passwordHash = await hashPassword(newPassword);
  await runPublicCommand(
    'account-holder',
    async () => {
      const person = await models().Person.findByPk(personId);
      if (person?.passwordHash === passwordHash) return { payloads: [], result: {} };
      if (person?.state !== 'active' || person.passwordHash !== provenHash) {
        throw new RefusedError({
          code: 'conflict',
          message: 'Not changed. The account was changed meanwhile. Load the page again.',
        });
      }
      return {
        payloads: [{ kind: 'password-changed', personId }],
        details: { passwordHash, standingSessionId: change.sessionId },
        actor: { personId, role: 'account-holder' },
        result: {},
      };
    },
    { clock: change.clock, repeatable: true },
  );
}
