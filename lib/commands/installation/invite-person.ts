import * as people from '@/lib/conduct/installation/people';
import { models } from '@/lib/db/connection';
import type { InstallationInput } from '@/lib/schemas/installation-inputs';
import { linkMail } from './link-mail';
import { loadPerson, newLinkToken, personFacts } from './person-facts';
import { type AdministratorRequest, runAdministratorCommand } from './run-installation-command';

/**
 * Invites a person and mails them a single-use link.
 * @returns the new person's id
 * @throws RefusedError when the address belongs to a person already
 */
export function invitePerson(
  request: AdministratorRequest,
  input: InstallationInput<'invite-person'>,
): Promise<{ personId: string }> {
  return runAdministratorCommand('invite-person', 'people.manage', request, async (context) => {
    const { email, printedName } = input;
    const addressInUse = (await models().Person.findOne({ where: { email } })) !== null;
    const personId = context.newId();
    const link = newLinkToken();
    const payloads = people.invitePerson(
      { addressInUse },
      input,
      { personId, linkDigest: link.digest },
      context,
    );
    return {
      payloads,
      details: { person: { email, printedName } },
      mails: [linkMail('invitation', link, { id: personId, email }, context.now)],
      result: { personId },
    };
  });
}

/** Mails an invitation again under a new link; the link sent before stops working. */
export function resendInvitation(
  request: AdministratorRequest,
  input: InstallationInput<'resend-invitation'>,
): Promise<{ personId: string }> {
  return runAdministratorCommand('resend-invitation', 'people.manage', request, async (context) => {
    const person = await loadPerson(input.personId);
    const link = newLinkToken();
    return {
      payloads: people.resendInvitation(personFacts(person), link.digest, context),
      mails: [linkMail('invitation', link, person, context.now)],
      result: { personId: person.id },
    };
  });
}
