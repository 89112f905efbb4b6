import { randomUUID } from 'node:crypto';
import { makeFirstAdministratorLink } from '@/lib/commands/first-administrator-link';
import { acceptLink } from '@/lib/commands/installation/accept-link';
import { createSite } from '@/lib/commands/installation/create-site';
import { createTrial } from '@/lib/commands/installation/create-trial';
import { invitePerson } from '@/lib/commands/installation/invite-person';
import type { AdministratorRequest } from '@/lib/commands/installation/run-installation-command';
import { models } from '@/lib/db/connection';
import { mailPayloadSchema } from '@/lib/schemas/mail-payloads';

/** A password that passes the rules, for people who exist in tests only. */
export const TEST_PASSWORD = 'gravel lantern orchid 47';

/** A request of a person, with a submission key of its own. */
export function requestOf(personId: string): AdministratorRequest {
  return { personId, submissionKey: randomUUID() };
}

/** The first administrator of an empty installation, by the link the start prints. */
export async function makeFirstAdministrator(email = 'admin@example.org'): Promise<string> {
  const link = await makeFirstAdministratorLink('http://localhost');
  if (link === null) throw new Error('There is an administrator already.');
  const { personId } = await acceptLink(
    { submissionKey: randomUUID() },
    {
      token: link.slice(link.lastIndexOf('/') + 1),
      email,
      printedName: 'Ottoline Harbury',
      password: TEST_PASSWORD,
    },
  );
  return personId;
}

/** The token of the newest link mail that waits for a person, as the mail would carry it. */
export async function tokenMailedTo(personId: string): Promise<string> {
  const mail = await models().OutboxMail.findOne({
    where: { personId, kind: ['invitation', 'password-reset'], state: 'queued' },
    order: [
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
    rejectOnEmpty: true,
  });
  const payload = mailPayloadSchema.parse(JSON.parse(mail.payload));
  if (!('token' in payload)) throw new Error('This mail carries no link.');
  return payload.token;
}

/** Invites a person who has not used their link yet. */
export async function makeInvited(
  administratorId: string,
  {
    email = `${randomUUID().slice(0, 8)}@example.org`,
    printedName = 'Ines Quarry',
    isAdministrator = false,
  } = {},
): Promise<{ personId: string; email: string }> {
  const input = { email, printedName, isAdministrator };
  const { personId } = await invitePerson(requestOf(administratorId), input);
  return { personId, email };
}

/** Invites a person and uses their link: they are active. */
export async function makeActive(
  administratorId: string,
  options: Parameters<typeof makeInvited>[1] = {},
): Promise<{ personId: string; email: string }> {
  const invited = await makeInvited(administratorId, options);
  const token = await tokenMailedTo(invited.personId);
  await acceptLink({ submissionKey: randomUUID() }, { token, password: TEST_PASSWORD });
  return invited;
}

let counter = 0;

/** A site under a code of its own. */
export async function makeSite(administratorId: string): Promise<string> {
  counter += 1;
  const input = { code: `ST${counter}`, name: `Clinic ${counter}`, timeZone: 'Europe/Vienna' };
  return (await createSite(requestOf(administratorId), input)).siteId;
}

/** A trial in draft with its first statistician. */
export async function makeTrial(
  administratorId: string,
): Promise<{ code: string; trialId: string; statisticianId: string }> {
  counter += 1;
  const { personId: statisticianId } = await makeActive(administratorId);
  const input = { code: `TRY-${counter}`, title: `Trial number ${counter}`, statisticianId };
  return { ...(await createTrial(requestOf(administratorId), input)), statisticianId };
}
