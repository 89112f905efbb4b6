import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { acceptLink } from '@/lib/commands/installation/accept-link';
import { disablePerson, enablePerson } from '@/lib/commands/installation/disable-person';
import { invitePerson, resendInvitation } from '@/lib/commands/installation/invite-person';
import { requestPasswordReset, resetByAdministrator } from '@/lib/commands/installation/password-reset';
import type { AdministratorRequest } from '@/lib/commands/installation/run-installation-command';
import { makeFirstAdministratorLink } from '@/lib/commands/first-administrator-link';
import { models } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { sha256 } from '@/lib/hash';
import { verifyStoredChain } from '@/lib/queries/verify-chain';
import {
  type ClaimedMail,
  claimMail,
  markFailed,
  markOvertaken,
  markSent,
  MOST_REFUSALS,
} from '@/lib/worker/outbox';
import {
  makeActive,
  makeFirstAdministrator,
  makeInvited,
  requestOf,
  TEST_PASSWORD,
  tokenMailedTo,
} from '../factories/installation';
import { createTestDatabase } from '../setup/database';

let administrator: string;
let coordinator: string;
beforeAll(async () => {
  await createTestDatabase();
  administrator = await makeFirstAdministrator();
  coordinator = (await makeActive(administrator)).personId;
});

const person = (id: string) => models().Person.findByPk(id, { rejectOnEmpty: true });
const installation = () => models().Installation.findByPk(1, { rejectOnEmpty: true });

/** The kinds of the events since a sequence, with who acted and in which capacity. */
async function eventsSince(sequence: number) {
  const events = await models().Event.findAll({
    where: { chain: 'installation' },
    order: [['sequence', 'ASC']],
  });
  return events
    .filter((event) => event.sequence > sequence)
    .map(({ kind, personId, role }) => ({ kind, personId, role }));
}

async function expectNothingRecorded(act: () => Promise<unknown>, refusal: object): Promise<void> {
  const before = await installation();
  await expect(act()).rejects.toMatchObject(refusal);
  const after = await installation();
  expect(after.chainSequence).toBe(before.chainSequence);
  expect(after.version).toBe(before.version);
}

async function session(personId: string): Promise<string> {
  const id = sha256(randomUUID());
  await inTransaction(() =>
    models().Session.create({
      id,
      personId,
      createdAt: new Date(),
      lastSeenAt: new Date(),
      expiresAt: new Date(Date.now() + 3_600_000),
      endedAt: null,
    }),
  );
  return id;
}

const NEWCOMER = { email: 'new@example.org', printedName: 'Newcomer', isAdministrator: false };

describe('every act of administration', () => {
  type Act = (request: AdministratorRequest, personId: string) => Promise<unknown>;
  const acts: [string, Act][] = [
    ['invite-person', (request) => invitePerson(request, NEWCOMER)],
    ['resend-invitation', (request, personId) => resendInvitation(request, { personId })],
    ['reset-by-administrator', (request, personId) => resetByAdministrator(request, { personId })],
    ['disable-person', (request, personId) => disablePerson(request, { personId })],
    ['enable-person', (request, personId) => enablePerson(request, { personId })],
  ];

  it.each(acts)('%s is refused to nobody in particular (signed out)', async (_name, act) => {
    const { personId } = await makeInvited(administrator);
    await expectNothingRecorded(() => act(requestOf(randomUUID()), personId), { code: 'not-found' });
  });

  it.each(acts)('%s is refused to a person who is no administrator', async (_name, act) => {
    const { personId } = await makeInvited(administrator);
    await expectNothingRecorded(() => act(requestOf(coordinator), personId), { code: 'not-found' });
  });

  it.each(acts)('%s is refused to an administrator who was disabled', async (_name, act) => {
    const { personId: former } = await makeActive(administrator, { isAdministrator: true });
    await disablePerson(requestOf(administrator), { personId: former });
    const { personId } = await makeInvited(administrator);
    await expectNothingRecorded(() => act(requestOf(former), personId), { code: 'not-found' });
  });

  it.each(acts.slice(1))('%s on a person who does not exist is refused as not found', async (_name, act) => {
    await expectNothingRecorded(() => act(requestOf(administrator), randomUUID()), { code: 'not-found' });
  });
});

describe('inviting', () => {
  it('keeps person, link, mail and trail in one act; the token stands nowhere but in the waiting mail', async () => {
    const { chainSequence } = await installation();
    const { personId, email } = await makeInvited(administrator);
    expect(await person(personId)).toMatchObject({ state: 'invited', email, passwordHash: null });
    expect(await eventsSince(chainSequence)).toEqual([
      { kind: 'person-invited', personId: administrator, role: 'administrator' },
      { kind: 'link-created', personId: administrator, role: 'administrator' },
    ]);
    const token = await tokenMailedTo(personId);
    expect(token).toMatch(/^[A-Za-z0-9_-]{43}$/);
    const link = await models().OneTimeLink.findByPk(sha256(token), { rejectOnEmpty: true });
    expect(link.expiresAt.getTime() - link.createdAt.getTime()).toBe(7 * 86_400_000);
    const payloads = await models().EventPayload.findAll();
    const trail = payloads.map(({ payload }) => payload).join('\n');
    expect(trail).not.toContain(token);
    expect(trail).not.toContain(email);
    expect(trail).not.toContain('Quarry');
  });

  it('an address that differs only in case is in use', async () => {
    const { email } = await makeInvited(administrator);
    await expectNothingRecorded(
      () => invitePerson(requestOf(administrator), { ...NEWCOMER, email: email.toUpperCase() }),
      { code: 'refused', fields: { email: 'Belongs to a person already.' } },
    );
  });

  it('the same form sent twice at once invites once', async () => {
    const request = requestOf(administrator);
    const input = { ...NEWCOMER, email: 'twice@example.org' };
    const [one, other] = await Promise.all([invitePerson(request, input), invitePerson(request, input)]);
    expect(one).toEqual(other);
    expect(await models().OutboxMail.count({ where: { personId: one.personId } })).toBe(1);
  });

  it('two administrators inviting one address at once: one is refused', async () => {
    const input = { ...NEWCOMER, email: 'rivals@example.org' };
    const results = await Promise.allSettled([
      invitePerson(requestOf(administrator), input),
      invitePerson(requestOf(administrator), input),
    ]);
    expect(results.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect(await models().Person.count({ where: { email: input.email } })).toBe(1);
  });

  it('sent again, the older link and its waiting mail stop counting', async () => {
    const { personId } = await makeInvited(administrator);
    const older = await tokenMailedTo(personId);
    await resendInvitation(requestOf(administrator), { personId });
    const newer = await tokenMailedTo(personId);
    expect(newer).not.toBe(older);
    const overtaken = await models().OutboxMail.findOne({
      where: { personId, state: 'overtaken' },
      rejectOnEmpty: true,
    });
    expect(overtaken.payload).toBe('{}');
    await expect(
      acceptLink({ submissionKey: randomUUID() }, { token: older, password: TEST_PASSWORD }),
    ).rejects.toMatchObject({ code: 'refused', message: expect.stringContaining('replaced by a newer one') });
    await acceptLink({ submissionKey: randomUUID() }, { token: newer, password: TEST_PASSWORD });
    expect((await person(personId)).state).toBe('active');
    await expectNothingRecorded(() => resendInvitation(requestOf(administrator), { personId }), {
      code: 'refused',
    });
  });
});

describe('using a link', () => {
  it('activates the person once when it is used twice at the same moment', async () => {
    const { personId, email } = await makeInvited(administrator);
    const token = await tokenMailedTo(personId);
    const { chainSequence } = await installation();
    const use = (password: string) => acceptLink({ submissionKey: randomUUID() }, { token, password });
    const results = await Promise.allSettled([use(TEST_PASSWORD), use('another orchid lantern 9')]);
    const refused = results.filter((result) => result.status === 'rejected');
    expect(refused).toHaveLength(1);
    expect(refused[0]?.reason).toMatchObject({
      code: 'refused',
      message: expect.stringContaining('used already'),
    });
    expect(results.find((result) => result.status === 'fulfilled')).toMatchObject({
      value: { personId, email },
    });
    expect(await eventsSince(chainSequence)).toEqual([
      { kind: 'person-activated', personId, role: 'link-holder' },
    ]);
    expect((await person(personId)).passwordHash).toMatch(/^\$argon2id\$/);
  });

  it('a double click on one form gets one answer', async () => {
    const { personId } = await makeInvited(administrator);
    const token = await tokenMailedTo(personId);
    const submissionKey = randomUUID();
    const use = () => acceptLink({ submissionKey }, { token, password: TEST_PASSWORD });
    const [one, other] = await Promise.all([use(), use()]);
    expect(one).toEqual(other);
  });

  it('an unknown link, and one past its time, are refused in words', async () => {
    await expectNothingRecorded(
      () => acceptLink({ submissionKey: randomUUID() }, { token: 'A'.repeat(43), password: TEST_PASSWORD }),
      { code: 'not-found', message: expect.stringContaining('not known') },
    );
    const { personId } = await makeInvited(administrator);
    const token = await tokenMailedTo(personId);
    const eightDaysOn = () => Date.now() + 8 * 86_400_000;
    await expectNothingRecorded(
      () =>
        acceptLink({ submissionKey: randomUUID(), clock: eightDaysOn }, { token, password: TEST_PASSWORD }),
      { code: 'refused', message: expect.stringContaining('expired') },
    );
    expect((await person(personId)).state).toBe('invited');
  });

  it('lets the invited person correct their printed name, and refuses a password made of it', async () => {
    const { personId } = await makeInvited(administrator, { printedName: 'Wrenfield Castlemaine' });
    const token = await tokenMailedTo(personId);
    await expectNothingRecorded(
      () =>
        acceptLink(
          { submissionKey: randomUUID() },
          { token, printedName: 'Wrenfield Castlemayne', password: 'castlemayne123' },
        ),
      { code: 'invalid', fields: { password: expect.any(String) } },
    );
    await acceptLink(
      { submissionKey: randomUUID() },
      { token, printedName: 'Wrenfield Castlemayne', password: TEST_PASSWORD },
    );
    expect((await person(personId)).printedName).toBe('Wrenfield Castlemayne');
  });
});

describe('a new password', () => {
  it('asked for by the administrator: mailed, used once, and every session ends', async () => {
    const { personId } = await makeActive(administrator);
    const before = (await person(personId)).passwordHash;
    const sessionId = await session(personId);
    const { chainSequence } = await installation();
    await resetByAdministrator(requestOf(administrator), { personId });
    expect((await models().Session.findByPk(sessionId))?.endedAt).toBeNull();
    const token = await tokenMailedTo(personId);
    await acceptLink({ submissionKey: randomUUID() }, { token, password: 'another orchid lantern 9' });
    expect((await person(personId)).passwordHash).not.toBe(before);
    expect((await models().Session.findByPk(sessionId))?.endedAt).not.toBeNull();
    expect(await eventsSince(chainSequence)).toEqual([
      { kind: 'password-reset-requested', personId: administrator, role: 'administrator' },
      { kind: 'links-ended', personId: administrator, role: 'administrator' },
      { kind: 'link-created', personId: administrator, role: 'administrator' },
      { kind: 'password-set', personId, role: 'link-holder' },
    ]);
  });

  it('asked for by a visitor: the same answer for known and unknown addresses, one mail in five minutes', async () => {
    const { personId, email } = await makeActive(administrator);
    const later = () => Date.now() + 10 * 60_000;
    const mails = () => models().OutboxMail.count({ where: { personId, kind: 'password-reset' } });
    const { chainSequence } = await installation();
    expect(await requestPasswordReset({ email: 'nobody@example.org' })).toBeUndefined();
    expect((await installation()).chainSequence).toBe(chainSequence);
    expect(await requestPasswordReset({ email }, { clock: later })).toBeUndefined();
    expect(await mails()).toBe(1);
    await Promise.all([requestPasswordReset({ email }), requestPasswordReset({ email })]);
    expect(await mails()).toBe(1);
    expect((await eventsSince(chainSequence))[0]).toEqual({
      kind: 'password-reset-requested',
      personId: null,
      role: 'visitor',
    });
  });

  it('is mailed to no disabled person', async () => {
    const { personId, email } = await makeActive(administrator);
    await disablePerson(requestOf(administrator), { personId });
    await requestPasswordReset({ email }, { clock: () => Date.now() + 3_600_000 });
    expect(await models().OutboxMail.count({ where: { personId, kind: 'password-reset' } })).toBe(0);
    await expectNothingRecorded(() => resetByAdministrator(requestOf(administrator), { personId }), {
      code: 'refused',
    });
  });
});

describe('disabling', () => {
  it('ends sessions and links in the same act; enabling gives the account back, signed out', async () => {
    const { personId } = await makeActive(administrator);
    const sessionId = await session(personId);
    await resetByAdministrator(requestOf(administrator), { personId });
    const token = await tokenMailedTo(personId);
    const { chainSequence } = await installation();
    await disablePerson(requestOf(administrator), { personId });
    expect((await person(personId)).state).toBe('disabled');
    expect((await models().Session.findByPk(sessionId))?.endedAt).not.toBeNull();
    await expect(
      acceptLink({ submissionKey: randomUUID() }, { token, password: TEST_PASSWORD }),
    ).rejects.toMatchObject({ code: 'refused' });
    await enablePerson(requestOf(administrator), { personId });
    expect((await person(personId)).state).toBe('active');
    expect((await models().Session.findByPk(sessionId))?.endedAt).not.toBeNull();
    expect((await eventsSince(chainSequence)).map(({ kind }) => kind)).toEqual([
      'person-disabled',
      'links-ended',
      'person-enabled',
    ]);
  });

  it('two administrators disabling each other at once: one of them stays', async () => {
    const one = (await makeActive(administrator, { isAdministrator: true })).personId;
    const other = (await makeActive(administrator, { isAdministrator: true })).personId;
    const results = await Promise.allSettled([
      disablePerson(requestOf(one), { personId: other }),
      disablePerson(requestOf(other), { personId: one }),
    ]);
    expect(results.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  });
});

describe('the first administrator', () => {
  it('gets no link where there is an administrator', async () => {
    expect(await makeFirstAdministratorLink('http://localhost')).toBeNull();
  });
});

describe('the token of a link mail', () => {
  const payloadOf = async (id: string) =>
    (await models().OutboxMail.findByPk(id, { rejectOnEmpty: true })).payload;
  type End = (mail: ClaimedMail) => Promise<boolean>;
  const ends: [string, number, End][] = [
    ['sent', 1, markSent],
    ['overtaken', 1, markOvertaken],
    ['given up', MOST_REFUSALS, (mail) => markFailed(mail, 'refused', true)],
  ];

  it.each(ends)('is wiped from the outbox once the mail was %s', async (_state, attempts, end) => {
    await inTransaction(() => models().OutboxMail.update({ state: 'sent' }, { where: { state: 'queued' } }));
    const { personId } = await makeInvited(administrator);
    const token = await tokenMailedTo(personId);
    const claimed = await claimMail('a worker');
    if (claimed === null) throw new Error('No mail waits.');
    expect(claimed.personId).toBe(personId);
    await inTransaction(() => models().OutboxMail.update({ attempts }, { where: { id: claimed.id } }));
    expect(await payloadOf(claimed.id)).toContain(token);
    expect(await end({ ...claimed, attempts })).toBe(true);
    expect(await payloadOf(claimed.id)).not.toContain(token);
  });

  it('stays while the mail is to be tried again', async () => {
    const { personId } = await makeInvited(administrator);
    const claimed = await claimMail('a worker');
    if (claimed === null) throw new Error('No mail waits.');
    expect(await markFailed(claimed, 'busy', true)).toBe(true);
    expect(await payloadOf(claimed.id)).toContain(await tokenMailedTo(personId));
  });
});

it('the chain of the installation is whole after all of this', async () => {
  const verdict = await verifyStoredChain('installation');
  expect(verdict?.firstBreak).toBeNull();
  expect(verdict?.events).toBe((await installation()).chainSequence);
});
