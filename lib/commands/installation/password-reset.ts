import { setTimeout as pause } from 'node:timers/promises';
import { newLink, requestedReset } from '@/lib/conduct/installation/links';
import * as people from '@/lib/conduct/installation/people';
import { models } from '@/lib/db/connection';
import type { InstallationInput } from '@/lib/schemas/installation-inputs';
import { linkMail } from './link-mail';
import { loadPerson, newLinkToken, personFacts } from './person-facts';
import {
  type AdministratorRequest,
  runAdministratorCommand,
  runPublicCommand,
} from './run-installation-command';

/** How long the answer to a reset takes at least, so that its speed does not tell whether the address is known. */
const SHORTEST_ANSWER_MILLISECONDS = 400;

/**
 * Asks for a link to choose a new password, from the sign-in page. The answer is the same, and as slow, whether the
 * address is known or not; an invited person gets their invitation again.
 */
export async function requestPasswordReset(
  input: InstallationInput<'request-password-reset'>,
  options: { readonly clock?: () => number } = {},
): Promise<void> {
  const work = runPublicCommand(
    'visitor',
    async (context) => {
      const { OneTimeLink, Person } = models();
      const person = await Person.findOne({ where: { email: input.email } });
      const last =
        person &&
        (await OneTimeLink.findOne({ where: { personId: person.id }, order: [['createdAt', 'DESC']] }));
      const kind = requestedReset(
        person && personFacts(person),
        last?.createdAt.toISOString() ?? null,
        context.now,
      );
      if (person === null || kind === null) return { payloads: [], result: {} };
      const link = newLinkToken();
      const made = { digest: link.digest, purpose: kind, personId: person.id };
      return {
        payloads: [
          { kind: 'password-reset-requested', personId: person.id },
          ...newLink(made, true, context),
        ],
        mails: [linkMail(kind, link, person, context.now)],
        result: {},
      };
    },
    { clock: options.clock, repeatable: true },
  );
  await Promise.all([work, pause(SHORTEST_ANSWER_MILLISECONDS)]);
}

/** Mails a link to choose a new password to a person who cannot sign in, asked for by an administrator. */
export function resetByAdministrator(
  request: AdministratorRequest,
  input: InstallationInput<'reset-by-administrator'>,
): Promise<{ personId: string }> {
  return runAdministratorCommand('reset-by-administrator', 'people.manage', request, async (context) => {
    const person = await loadPerson(input.personId);
    const link = newLinkToken();
    return {
      payloads: people.resetByAdministrator(personFacts(person), link.digest, context),
      mails: [linkMail('password-reset', link, person, context.now)],
      result: { personId: person.id },
    };
  });
}
