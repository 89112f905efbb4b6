import { hashPassword } from '@/lib/auth/passwords';
import { tokenDigest } from '@/lib/auth/tokens';
import { acceptLink as decideLink, type OneTimeLinkFacts } from '@/lib/conduct/installation/links';
import { models } from '@/lib/db/connection';
import { RefusedError } from '@/lib/errors';
import { newId } from '@/lib/hash';
import type { InstallationInput } from '@/lib/schemas/installation-inputs';
import { whyGuessable } from '@/lib/schemas/password';
import type { Person } from '@/models/person';
import { storeSubmission, submissionResult } from '../submissions';
import { linkFacts, personFacts } from './person-facts';
import { runPublicCommand } from './run-installation-command';

type AcceptInput = InstallationInput<'accept-link'>;

export interface AcceptLinkRequest {
  readonly submissionKey: string;
  readonly clock?: () => number;
}

/** Who may now sign in with the password chosen. */
export interface AcceptedLink {
  readonly personId: string;
  readonly email: string;
}

/** What the first administrator has to say about themselves. */
function firstAdministrator(input: AcceptInput): { email: string; printedName: string } {
  const { email, printedName } = input;
  if (email !== undefined && printedName !== undefined) return { email, printedName };
  throw new RefusedError({
    code: 'invalid',
    message: 'Not created. Enter your e-mail address and your name.',
    fields: {
      ...(email === undefined ? { email: 'Enter your e-mail address.' } : {}),
      ...(printedName === undefined ? { printedName: 'Enter your name.' } : {}),
    },
  });
}

/** The password may not be made of the person's own name or address. */
function refuseGuessable(password: string, person: { email: string; printedName: string }): void {
  const why = whyGuessable(password, [person.email, person.printedName]);
  if (why === null) return;
  throw new RefusedError({ code: 'invalid', message: why, fields: { password: why } });
}

/** The person a link is of; for the first administrator one who has the address typed. */
async function personOf(link: OneTimeLinkFacts | null, input: AcceptInput): Promise<Person | null> {
  const { Person } = models();
  if (link === null) return null;
  if (link.purpose !== 'first-administrator') return Person.findByPk(link.personId ?? '');
  return input.email === undefined ? null : Person.findOne({ where: { email: input.email } });
}

/**
 * Uses a single-use link: an invited person chooses a password (and may correct their printed name) and is active; a
 * person who forgot theirs chooses a new one, and their sessions end; the first administrator is created. The link is
 * read under the installation's lock, so that of two uses at once one is refused. The same form sent twice gets the same
 * answer.
 * @throws RefusedError "not-found" for an unknown link, "refused" for one that was used or has expired
 */
export async function acceptLink(request: AcceptLinkRequest, input: AcceptInput): Promise<AcceptedLink> {
  const passwordHash = await hashPassword(input.password);
  return runPublicCommand<AcceptedLink>(
    'link-holder',
    async (context) => {
      const { OneTimeLink, Person } = models();
      const row = await OneTimeLink.findByPk(tokenDigest(input.token));
      const link = row && linkFacts(row);
      const person = await personOf(link, input);
      if (person !== null && link?.usedAt != null) {
        const earlier = await submissionResult(person.id, request.submissionKey, 'accept-link');
        if (earlier !== null) return { payloads: [], result: earlier as AcceptedLink };
      }
      const isFirst = link?.purpose === 'first-administrator';
      const administrators = isFirst
        ? await Person.count({ where: { isAdministrator: true, state: 'active' } })
        : 0;
      const personId = person && !isFirst ? person.id : newId();
      const payloads = decideLink(
        {
          link,
          person: person && personFacts(person),
          administratorExists: administrators > 0,
          addressInUse: isFirst && person !== null,
        },
        personId,
        context,
      );
      const named = isFirst ? firstAdministrator(input) : person;
      if (named === null) throw new Error('A link that works belongs to a person.');
      refuseGuessable(input.password, {
        email: named.email,
        printedName: input.printedName ?? named.printedName,
      });
      const result = { personId, email: named.email };
      return {
        payloads,
        details: {
          passwordHash,
          ...(isFirst ? { person: { email: named.email, printedName: named.printedName } } : {}),
          printedName: input.printedName,
        },
        actor: { personId, role: 'link-holder' },
        result,
        afterwards: () =>
          storeSubmission(personId, request.submissionKey, 'accept-link', result, context.now),
      };
    },
    { clock: request.clock, repeatable: true },
  );
}
