import { randomUUID } from 'node:crypto';
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { disablePerson } from '@/lib/commands/installation/disable-person';
import { runTrialCommand } from '@/lib/commands/run-trial-command';
import { sequelize } from '@/lib/db/connection';
import { installationHealth } from '@/lib/queries/administration/health';
import { mailIsHeld, mailList } from '@/lib/queries/administration/mail';
import { administrationOverview } from '@/lib/queries/administration/overview';
import { peopleList, personPage } from '@/lib/queries/administration/people';
import { siteList } from '@/lib/queries/administration/sites';
import { candidates, trialList, trialTeamPage } from '@/lib/queries/administration/trials';
import {
  makeActive,
  makeFirstAdministrator,
  makeInvited,
  makeSite,
  makeTrial,
  requestOf,
} from '../factories/installation';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
let administrator: string;
let trialCode: string;
let siteId: string;
let coordinator: string;

async function fill(): Promise<void> {
  const trial = await makeTrial(administrator);
  trialCode = trial.code;
  siteId = await makeSite(administrator);
  coordinator = (await makeActive(administrator, { printedName: 'Odo Marchetti' })).personId;
  const act = { ...requestOf(administrator), trialCode };
  await runTrialCommand({ ...act, command: { type: 'add-site', input: { siteId } } });
  await runTrialCommand({
    ...act,
    submissionKey: randomUUID(),
    command: {
      type: 'grant-membership',
      input: { personId: coordinator, role: 'coordinator', siteIds: [siteId] },
    },
  });
}

beforeAll(async () => {
  database = await createTestDatabase();
  administrator = await makeFirstAdministrator();
  await fill();
});
afterEach(() => vi.restoreAllMocks());

/** How many statements a page's queries send. */
async function statements(read: () => Promise<unknown>): Promise<number> {
  const query = vi.spyOn(sequelize(), 'query');
  await read();
  const count = query.mock.calls.length;
  query.mockRestore();
  return count;
}

/** What each page reads, beside the one statement of the session. */
const pages: [string, number, () => Promise<unknown>][] = [
  ['overview', 1, administrationOverview],
  ['people', 1, () => peopleList('')],
  ['person', 1, () => personPage(coordinator)],
  ['sites', 1, siteList],
  ['trials', 2, () => Promise.all([trialList(), candidates()])],
  ['team of a trial', 3, () => Promise.all([trialTeamPage(trialCode), candidates()])],
  ['mail', 2, () => mailList(null)],
  ['health', 3, installationHealth],
];

describe('statements of a page', () => {
  it.each(pages)('%s: %i, however much there is', async (_page, count, read) => {
    expect(await statements(read)).toBe(count);
    await fill();
    expect(await statements(read)).toBe(count);
  });
});

describe('people', () => {
  it('are found by a part of name or address, whatever marks it holds', async () => {
    await makeInvited(administrator, {
      printedName: '100% Underscore_Name',
      email: 'under_score@example.org',
    });
    expect((await peopleList('00%')).people).toHaveLength(1);
    expect((await peopleList('r_s')).people).toHaveLength(1);
    expect((await peopleList('e_N')).people).toHaveLength(1);
    expect(await peopleList('xyz%')).toEqual({ people: [], found: 0 });
    expect((await peopleList("' OR 1=1 --")).found).toBe(0);
    expect((await peopleList('\\')).found).toBe(0);
    expect((await peopleList('marchetti')).people[0]?.roles).toEqual([
      { trialCode: expect.any(String), role: 'coordinator' },
    ]);
  });

  it('a person’s page holds roles, sites and the link that still works', async () => {
    expect(await personPage(coordinator)).toMatchObject({
      state: 'active',
      link: null,
      openSessions: 0,
      memberships: [
        { trialCode, role: 'coordinator', sites: [expect.stringMatching(/^ST\d+$/)], endedAt: null },
      ],
    });
    const { personId } = await makeInvited(administrator);
    expect(await personPage(personId)).toMatchObject({ state: 'invited', link: { purpose: 'invitation' } });
    await disablePerson(requestOf(administrator), { personId });
    expect(await personPage(personId)).toMatchObject({ state: 'disabled', link: null });
    expect(await personPage(randomUUID())).toBeNull();
  });

  it('an invitation whose link ran out is counted', async () => {
    const before = (await administrationOverview()).staleInvitations;
    const { personId } = await makeInvited(administrator);
    await database.asOwner((owner) =>
      owner.query('UPDATE one_time_links SET expires_at = created_at WHERE person_id = ?', [personId]),
    );
    expect((await administrationOverview()).staleInvitations).toBe(before + 1);
  });
});

describe('trials', () => {
  it('show their team and sites, and no clinical data', async () => {
    const page = await trialTeamPage(trialCode);
    expect(page?.sites.map((site) => site.siteId)).toEqual([siteId]);
    expect(page?.sitesToAdd.length).toBeGreaterThan(0);
    expect(page?.members.map(({ role }) => role)).toEqual(['coordinator', 'statistician']);
    expect(Object.keys(page ?? {}).sort()).toEqual(
      ['code', 'members', 'quorum', 'sites', 'sitesToAdd', 'state', 'title'].sort(),
    );
    expect(await trialTeamPage('NONE-1')).toBeNull();
  });

  it('offer no administrator and no disabled account for a role', async () => {
    const { personId } = await makeActive(administrator);
    await disablePerson(requestOf(administrator), { personId });
    const ids = (await candidates()).map((candidate) => candidate.personId);
    expect(ids).toContain(coordinator);
    expect(ids).not.toContain(administrator);
    expect(ids).not.toContain(personId);
  });
});

describe('mail', () => {
  it('is listed by state without what it says', async () => {
    const { counts, mails } = await mailList('overtaken');
    expect(mails).toHaveLength(counts.overtaken);
    const all = await mailList(null);
    expect(all.mails.length).toBe(Object.values(all.counts).reduce((sum, count) => sum + count, 0));
    expect(JSON.stringify(all)).not.toContain('token');
  });

  it('is held in earnest without a mail server only', () => {
    expect(mailIsHeld('production')).toBe(true);
    expect(mailIsHeld('demo')).toBe(false);
    expect(mailIsHeld('test')).toBe(false);
  });
});

describe('health', () => {
  it('says what holds: migrations, worker, trail', async () => {
    const health = await installationHealth();
    expect(health.kind).toBe('test');
    expect(health.migrations).toMatchObject({ pending: [], unknown: [] });
    expect(health.migrations.ran).toBeGreaterThan(20);
    expect(health.workerLastActiveAt).toBeNull();
    expect(health.oldestDueMailAt).not.toBeNull();
    expect(health.trail.firstBreak).toBeNull();
  });

  it('names a migration that did not run to its end, and one this code does not know', async () => {
    await database.asOwner(async (owner) => {
      await owner.query("UPDATE migrations SET finished_at = NULL WHERE name = '0027-create-caught-mails'");
      await owner.query("INSERT INTO migrations (name, finished_at) VALUES ('9999-later', UTC_TIMESTAMP(3))");
    });
    const { migrations } = await installationHealth();
    expect(migrations.pending).toEqual(['0027-create-caught-mails']);
    expect(migrations.unknown).toEqual(['9999-later']);
  });
});
