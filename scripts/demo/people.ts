import { models } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { newId } from '@/lib/hash';
import { acceptLink } from '@/lib/commands/installation/accept-link';
import { createSite } from '@/lib/commands/installation/create-site';
import { invitePerson } from '@/lib/commands/installation/invite-person';
import { makeFirstAdministratorLink } from '@/lib/commands/first-administrator-link';
import type { Player } from './play-trial';

/** Everyone in the demonstration is invented; the addresses are of a domain kept for examples (RFC 2606). */
const DEMO_PASSWORD = 'quiet water below';

const INVITED = {
  aldermoor: ['lena.okoro', 'Lena Okoro', 'Site coordinator at Aldermoor Hospital'],
  valk: ['piet.varga', 'Piet Varga', 'Site coordinator at the Valk Institute'],
  serafin: ['sunniva.hale', 'Sunniva Hale', 'Site coordinator at the Serafin Clinic'],
  firstReviewer: ['ines.maartens', 'Dr Ines Maartens', 'Safety reviewer'],
  secondReviewer: ['oke.lindqvist', 'Dr Oke Lindqvist', 'Safety reviewer'],
  thirdReviewer: ['mira.castellan', 'Dr Mira Castellan', 'Safety reviewer'],
  statistician: ['jonas.abele', 'Jonas Abele', 'Statistician'],
  sponsor: ['carla.whitmore', 'Carla Whitmore', 'Sponsor'],
} as const;

export type DemoRole = keyof typeof INVITED | 'administrator';
export type DemoPeople = Readonly<Record<DemoRole, Player>>;

export interface DemoSites {
  readonly aldermoor: string;
  readonly valk: string;
  readonly serafin: string;
}

const email = (local: string): string => `${local}@demo.example`;

/** The token of an invitation, as its holder reads it in the mail. */
async function mailedToken(personId: string): Promise<string> {
  const mail = await models().OutboxMail.findOne({
    where: { personId, kind: 'invitation' },
    rejectOnEmpty: true,
  });
  const payload = JSON.parse(mail.payload) as { token: string };
  return payload.token;
}

/** Creates the administrator by the first link, everyone else by invitation, and the sites, at a given time. */
export async function createDemoPeople(at: number): Promise<{ people: DemoPeople; sites: DemoSites }> {
  const clock = () => at;
  const link = await makeFirstAdministratorLink('', clock);
  const token = link?.split('/').at(-1) ?? '';
  const accepted = await acceptLink(
    { submissionKey: newId(), clock },
    { token, email: email('tomas.ferrin'), printedName: 'Tomas Ferrin', password: DEMO_PASSWORD },
  );
  const administrator: Player = {
    personId: accepted.personId,
    email: accepted.email,
    password: DEMO_PASSWORD,
  };
  const request = () => ({ personId: administrator.personId, submissionKey: newId(), clock });

  const people: Partial<Record<DemoRole, Player>> = { administrator };
  for (const [role, [local, printedName]] of Object.entries(INVITED)) {
    const { personId } = await invitePerson(request(), {
      email: email(local),
      printedName,
      isAdministrator: false,
    });
    await acceptLink(
      { submissionKey: newId(), clock },
      { token: await mailedToken(personId), password: DEMO_PASSWORD },
    );
    people[role as DemoRole] = { personId, email: email(local), password: DEMO_PASSWORD };
  }
  const site = async (code: string, name: string, timeZone: string) =>
    (await createSite(request(), { code, name, timeZone })).siteId;
  const sites = {
    aldermoor: await site('ALD', 'Aldermoor Hospital', 'Europe/London'),
    valk: await site('VLK', 'Valk Institute', 'Europe/Amsterdam'),
    serafin: await site('SRF', 'Serafin Clinic', 'America/Halifax'),
  };
  return { people: people as DemoPeople, sites };
}

/** Lists the demo accounts, for the sign-in page and the start script. */
export async function listDemoAccounts(people: DemoPeople): Promise<void> {
  const descriptions: Record<DemoRole, string> = {
    administrator: 'Administrator',
    ...(Object.fromEntries(Object.entries(INVITED).map(([role, [, , words]]) => [role, words])) as Record<
      keyof typeof INVITED,
      string
    >),
  };
  await inTransaction(async () => {
    await models().DemoAccount.bulkCreate(
      Object.entries(people).map(([role, player], position) => ({
        personId: player.personId,
        password: player.password,
        description: descriptions[role as DemoRole],
        position,
      })),
    );
  });
}
