import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { makeFirstAdministratorLink } from '@/lib/commands/first-administrator-link';
import { acceptLink } from '@/lib/commands/installation/accept-link';
import { createSite } from '@/lib/commands/installation/create-site';
import { createTrial } from '@/lib/commands/installation/create-trial';
import { disablePerson } from '@/lib/commands/installation/disable-person';
import { retryMail } from '@/lib/commands/installation/retry-mail';
import type { AdministratorRequest } from '@/lib/commands/installation/run-installation-command';
import { runTrialCommand } from '@/lib/commands/run-trial-command';
import { models } from '@/lib/db/connection';
import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { verifyEveryChain, verifyStoredChain } from '@/lib/queries/verify-chain';
import {
  makeActive,
  makeFirstAdministrator,
  makeInvited,
  makeSite,
  makeTrial,
  requestOf,
  TEST_PASSWORD,
} from '../factories/installation';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
let administrator: string;
let coordinator: string;
let olderLink: string | null;
beforeAll(async () => {
  database = await createTestDatabase();
  olderLink = await makeFirstAdministratorLink('http://localhost');
  administrator = await makeFirstAdministrator();
  coordinator = (await makeActive(administrator)).personId;
});

type TeamRequest = AdministratorRequest & { trialCode: string };
const addSiteToTrial = (request: TeamRequest, input: TrialInput<'add-site'>) =>
  runTrialCommand({ ...request, command: { type: 'add-site', input } });
const grantMembership = (request: TeamRequest, input: TrialInput<'grant-membership'>) =>
  runTrialCommand({ ...request, command: { type: 'grant-membership', input } });
const endMembership = (request: TeamRequest, input: TrialInput<'end-membership'>) =>
  runTrialCommand({ ...request, command: { type: 'end-membership', input } });

const headOfInstallation = async () =>
  (await models().Installation.findByPk(1, { rejectOnEmpty: true })).chainSequence;

async function expectNothingRecorded(act: () => Promise<unknown>, refusal: object): Promise<void> {
  const count = () => models().Event.count();
  const before = await count();
  await expect(act()).rejects.toMatchObject(refusal);
  expect(await count()).toBe(before);
}

async function lastEvents(chain: string, count: number) {
  const events = await models().Event.findAll({
    where: { chain },
    order: [['sequence', 'DESC']],
    limit: count,
  });
  return events.reverse().map(({ kind, personId, role }) => ({ kind, personId, role }));
}

describe('the first administrator’s link', () => {
  it('stops working when a newer one is made, and makes the first administrator only', async () => {
    const token = olderLink?.split('/').at(-1) ?? '';
    expect(olderLink).toMatch(/^http:\/\/localhost\/[a-z]+\/[A-Za-z0-9_-]{43}$/);
    await expectNothingRecorded(
      () =>
        acceptLink(
          { submissionKey: randomUUID() },
          { token, email: 'second@example.org', printedName: 'Second Person', password: TEST_PASSWORD },
        ),
      { code: 'refused', message: expect.stringContaining('replaced by a newer one') },
    );
    const person = await models().Person.findByPk(administrator, { rejectOnEmpty: true });
    expect(person).toMatchObject({ isAdministrator: true, state: 'active' });
  });
});

describe('a site', () => {
  const input = { code: 'ALD', name: 'Alder Clinic', timeZone: 'Europe/Vienna' };

  it('is created with its event', async () => {
    const { siteId } = await createSite(requestOf(administrator), input);
    expect(await models().Site.findByPk(siteId)).toMatchObject(input);
    expect(await lastEvents('installation', 1)).toEqual([
      { kind: 'site-created', personId: administrator, role: 'administrator' },
    ]);
  });

  it('is refused where its code is in use, to others and to the signed out', async () => {
    await expectNothingRecorded(() => createSite(requestOf(administrator), input), {
      code: 'refused',
      fields: { code: expect.any(String) },
    });
    const other = { ...input, code: 'BIR' };
    await expectNothingRecorded(() => createSite(requestOf(coordinator), other), { code: 'not-found' });
    await expectNothingRecorded(() => createSite(requestOf(randomUUID()), other), { code: 'not-found' });
  });
});

describe('a trial', () => {
  const input = (statisticianId: string, code = 'WELL-07') => ({
    code,
    title: 'An invented trial',
    statisticianId,
  });

  it('is created in draft with its statistician, its own chain and the event of the installation', async () => {
    const { personId } = await makeActive(administrator);
    const { trialId, code } = await createTrial(requestOf(administrator), input(personId));
    expect(await models().Trial.findByPk(trialId)).toMatchObject({ code, state: 'draft', chainSequence: 2 });
    expect(await models().Membership.findOne({ where: { trialId } })).toMatchObject({
      personId,
      role: 'statistician',
      endedAt: null,
    });
    expect(await lastEvents(trialId, 2)).toEqual([
      { kind: 'trial-created', personId: administrator, role: 'administrator' },
      { kind: 'member-granted', personId: administrator, role: 'administrator' },
    ]);
    expect(await lastEvents('installation', 1)).toEqual([
      { kind: 'trial-registered', personId: administrator, role: 'administrator' },
    ]);
    expect((await verifyStoredChain(trialId))?.firstBreak).toBeNull();
  });

  it('is refused where its code is in use, whatever its case', async () => {
    const { personId } = await makeActive(administrator);
    await expectNothingRecorded(() => createTrial(requestOf(administrator), input(personId, 'well-07')), {
      code: 'refused',
      fields: { code: 'Is the code of another trial.' },
    });
  });

  it('is refused with an administrator, a disabled account or nobody as its statistician', async () => {
    const other = await makeActive(administrator, { isAdministrator: true });
    const gone = await makeActive(administrator);
    await disablePerson(requestOf(administrator), { personId: gone.personId });
    for (const statisticianId of [administrator, other.personId, gone.personId, randomUUID()]) {
      await expectNothingRecorded(
        () => createTrial(requestOf(administrator), input(statisticianId, 'WELL-08')),
        { fields: { statisticianId: expect.any(String) } },
      );
    }
  });

  it('is refused to others and to the signed out', async () => {
    await expectNothingRecorded(() => createTrial(requestOf(coordinator), input(coordinator, 'WELL-09')), {
      code: 'not-found',
    });
    await expectNothingRecorded(() => createTrial(requestOf(randomUUID()), input(coordinator, 'WELL-09')), {
      code: 'not-found',
    });
  });

  it('created twice at once under one code exists once', async () => {
    const { personId } = await makeActive(administrator);
    const results = await Promise.allSettled(
      Array.from({ length: 4 }, () => createTrial(requestOf(administrator), input(personId, 'WELL-10'))),
    );
    expect(results.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    expect(await models().Trial.count({ where: { code: 'WELL-10' } })).toBe(1);
  });
});

describe('the team of a trial', () => {
  const inTrial = (personId: string, trialCode: string) => ({ ...requestOf(personId), trialCode });

  async function trialWithSite() {
    const trial = await makeTrial(administrator);
    const siteId = await makeSite(administrator);
    await addSiteToTrial(inTrial(administrator, trial.code), { siteId });
    return { ...trial, siteId };
  }

  it('takes in a site, once; an unknown one is not found', async () => {
    const { code, trialId, siteId } = await trialWithSite();
    expect(await lastEvents(trialId, 1)).toEqual([
      { kind: 'site-added', personId: administrator, role: 'administrator' },
    ]);
    await expectNothingRecorded(() => addSiteToTrial(inTrial(administrator, code), { siteId }), {
      code: 'refused',
      fields: { siteId: expect.any(String) },
    });
    await expectNothingRecorded(
      () => addSiteToTrial(inTrial(administrator, code), { siteId: randomUUID() }),
      {
        code: 'not-found',
      },
    );
    const another = await makeSite(administrator);
    await expectNothingRecorded(() => addSiteToTrial(inTrial(coordinator, code), { siteId: another }), {
      code: 'not-found',
    });
    await expectNothingRecorded(() => addSiteToTrial(inTrial(administrator, 'NONE-1'), { siteId: another }), {
      code: 'not-found',
    });
  });

  it('gives a role for sites and ends it; a person may come back', async () => {
    const { code, trialId, siteId } = await trialWithSite();
    const { personId } = await makeActive(administrator);
    const grant = { personId, role: 'coordinator' as const, siteIds: [siteId] };
    await grantMembership(inTrial(administrator, code), grant);
    expect(await lastEvents(trialId, 1)).toEqual([
      { kind: 'member-granted', personId: administrator, role: 'administrator' },
    ]);
    const membership = await models().Membership.findOne({
      where: { trialId, personId },
      rejectOnEmpty: true,
    });
    expect(await models().MembershipSite.count({ where: { membershipId: membership.id } })).toBe(1);
    await endMembership(inTrial(administrator, code), { personId });
    await membership.reload();
    expect(membership.endedAt).not.toBeNull();
    await expectNothingRecorded(() => endMembership(inTrial(administrator, code), { personId }), {
      code: 'not-found',
    });
    await grantMembership(inTrial(administrator, code), { personId, role: 'sponsor', siteIds: [] });
    await membership.reload();
    expect(membership).toMatchObject({ endedAt: null, role: 'sponsor' });
  });

  it('refuses what breaks the separation of roles, naming the field', async () => {
    const { code, siteId, statisticianId } = await trialWithSite();
    const fellow = (await makeActive(administrator, { isAdministrator: true })).personId;
    const grant = (personId: string, role: 'coordinator' | 'reviewer', siteIds: string[] = []) =>
      grantMembership(inTrial(administrator, code), { personId, role, siteIds });
    // A second role in one trial.
    await expectNothingRecorded(() => grant(statisticianId, 'reviewer'), {
      code: 'refused',
      fields: { personId: 'Already statistician.' },
    });
    // A role for the one who grants it, or for another administrator.
    await expectNothingRecorded(() => grant(administrator, 'reviewer'), {
      fields: { personId: 'This is you.' },
    });
    await expectNothingRecorded(() => grant(fellow, 'coordinator', [siteId]), {
      fields: { personId: expect.stringContaining('is an administrator') },
    });
    // A signing role for one who recorded data of the trial.
    const { personId } = await makeActive(administrator);
    await grant(personId, 'coordinator', [siteId]);
    await endMembership(inTrial(administrator, code), { personId });
    await database.asOwner((owner) =>
      owner.query('UPDATE memberships SET has_recorded_data = TRUE WHERE person_id = ?', [personId]),
    );
    await expectNothingRecorded(() => grant(personId, 'reviewer'), {
      code: 'refused',
      fields: { role: 'May not sign in this trial.' },
    });
    await grant(personId, 'coordinator', [siteId]);
  });

  it('is changed by administrators only, and only for people who exist', async () => {
    const { code, statisticianId, siteId } = await trialWithSite();
    const { personId } = await makeInvited(administrator);
    const grant = { personId, role: 'coordinator' as const, siteIds: [siteId] };
    for (const stranger of [coordinator, statisticianId, randomUUID()]) {
      await expectNothingRecorded(() => grantMembership(inTrial(stranger, code), grant), {
        code: 'not-found',
      });
      await expectNothingRecorded(
        () => endMembership(inTrial(stranger, code), { personId: statisticianId }),
        { code: 'not-found' },
      );
    }
    await expectNothingRecorded(
      () => grantMembership(inTrial(administrator, code), { ...grant, personId: randomUUID() }),
      { code: 'not-found' },
    );
    await expectNothingRecorded(
      () => grantMembership(inTrial(administrator, code), { ...grant, siteIds: [randomUUID()] }),
      { fields: { siteIds: expect.any(String) } },
    );
    await grantMembership(inTrial(administrator, code), grant);
  });

  it('grants one of two rival roles given at the same moment', async () => {
    const { code, trialId, siteId } = await trialWithSite();
    const { personId } = await makeActive(administrator);
    const results = await Promise.allSettled([
      grantMembership(inTrial(administrator, code), { personId, role: 'coordinator', siteIds: [siteId] }),
      grantMembership(inTrial(administrator, code), { personId, role: 'reviewer', siteIds: [] }),
    ]);
    expect(results.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect(await models().Membership.count({ where: { trialId, personId } })).toBe(1);
  });
});

describe('a mail that was given up', () => {
  async function deadMail(kind: string): Promise<string> {
    const id = randomUUID();
    await database.asOwner((owner) =>
      owner.query(
        `INSERT INTO outbox (id, kind, cause, address, payload, priority, state, attempts, message_id, created_at)
         VALUES (?, ?, ?, 'reader@example.org', '{}', 5, 'dead', 8, ?, UTC_TIMESTAMP(3))`,
        [id, kind, id, `<${id}@stepwell.invalid>`],
      ),
    );
    return id;
  }
  const retry = (request: AdministratorRequest, mailId: string) => retryMail(request, { mailId });

  it('is queued again by an administrator, with its event', async () => {
    const mailId = await deadMail('trial-halted');
    await retry(requestOf(administrator), mailId);
    expect(await models().OutboxMail.findByPk(mailId)).toMatchObject({ state: 'queued', attempts: 0 });
    expect(await lastEvents('installation', 1)).toEqual([
      { kind: 'mail-queued-again', personId: administrator, role: 'administrator' },
    ]);
    await expectNothingRecorded(() => retry(requestOf(administrator), mailId), { code: 'refused' });
  });

  it('is not when its link was wiped, when it does not exist, or when others ask', async () => {
    const invitation = await deadMail('invitation');
    await expectNothingRecorded(() => retry(requestOf(administrator), invitation), { code: 'refused' });
    await expectNothingRecorded(() => retry(requestOf(administrator), randomUUID()), { code: 'not-found' });
    const mailId = await deadMail('trial-halted');
    await expectNothingRecorded(() => retry(requestOf(coordinator), mailId), { code: 'not-found' });
    await expectNothingRecorded(() => retry(requestOf(randomUUID()), mailId), { code: 'not-found' });
  });
});

describe('verifying the trail', () => {
  async function verdicts() {
    const found = [];
    for await (const verdict of verifyEveryChain()) found.push(verdict);
    return found;
  }

  it('finds every chain whole, the installation’s first', async () => {
    const found = await verdicts();
    expect(found[0]).toMatchObject({ chain: 'installation', events: await headOfInstallation() });
    expect(found).toHaveLength(1 + (await models().Trial.count()));
    expect(found.filter(({ firstBreak }) => firstBreak !== null)).toEqual([]);
  });

  it('names the first broken link after somebody with wider rights changed, removed or cut off events', async () => {
    const { trialId, statisticianId } = await makeTrial(administrator);
    const breakOf = async () => (await verifyStoredChain(trialId))?.firstBreak;
    const tamper = (sql: string, values: unknown[]) =>
      database.asOwner(async (owner) => {
        for (const [table, act] of [
          ['events', 'update'],
          ['events', 'delete'],
          ['event_payloads', 'update'],
          ['event_payloads', 'delete'],
        ]) {
          await owner.query(`DROP TRIGGER IF EXISTS ${table}_refuse_${act}`);
        }
        await owner.query(sql, values);
      });

    await tamper('UPDATE events SET person_id = ? WHERE chain = ? AND sequence = 2', [
      statisticianId,
      trialId,
    ]);
    expect(await breakOf()).toMatchObject({ sequence: 2, reason: 'hash-differs' });
    await tamper('UPDATE events SET person_id = ? WHERE chain = ? AND sequence = 2', [
      administrator,
      trialId,
    ]);
    expect(await breakOf()).toBeNull();

    const payloadOf = 'event_id = (SELECT id FROM events WHERE chain = ? AND sequence = 2)';
    await tamper(
      `UPDATE event_payloads SET payload = REPLACE(payload, 'statistician', 'coordinator') WHERE ${payloadOf}`,
      [trialId],
    );
    expect(await breakOf()).toMatchObject({ sequence: 2, reason: 'payload-differs' });
    await tamper(`DELETE FROM event_payloads WHERE ${payloadOf}`, [trialId]);
    expect(await breakOf()).toMatchObject({ sequence: 2, reason: 'payload-missing' });
    await tamper('DELETE FROM events WHERE chain = ? AND sequence = 2', [trialId]);
    expect(await breakOf()).toMatchObject({ sequence: 2, reason: 'head-differs' });
  });
});
