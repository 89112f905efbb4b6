import { beforeAll, describe, expect, it, vi } from 'vitest';
import { tokenDigest } from '@/lib/auth/tokens';
import { changePassword } from '@/lib/commands/change-password';
import { endOwnSession, endSession, touchSession } from '@/lib/commands/end-session';
import { acceptLink } from '@/lib/commands/installation/accept-link';
import { disablePerson } from '@/lib/commands/installation/disable-person';
import { resetByAdministrator } from '@/lib/commands/installation/password-reset';
import { proveIdentity } from '@/lib/commands/prove-identity';
import { startSession } from '@/lib/commands/start-session';
import { models, sequelize } from '@/lib/db/connection';
import { newId } from '@/lib/hash';
import { IDLE_MS, LONGEST_SESSION_MS } from '@/lib/policy/session-times';
import { ownSessions } from '@/lib/queries/own-sessions';
import { sessionReader } from '@/lib/queries/session-reader';
import { verifyStoredChain } from '@/lib/queries/verify-chain';
import { makeActive, requestOf, TEST_PASSWORD, tokenMailedTo } from '../factories/installation';
import { playTeam } from '../factories/played-trial';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
let administrator: string;
type Played = Awaited<ReturnType<typeof playTeam>>;
let team: Played['team'];
let code: string;

beforeAll(async () => {
  database = await createTestDatabase();
  const played = await playTeam();
  team = played.team;
  code = played.trial.code;
  administrator = team.administrator.personId;
});

const claim = (email: string, password = TEST_PASSWORD) =>
  proveIdentity({ email, password, purpose: 'sign-in', clientAddress: '192.0.2.1' });
const begin = async (email: string, clock?: () => number) => {
  const token = await startSession(await claim(email), clock);
  return { token, id: tokenDigest(token) };
};

describe('the reader of a session', () => {
  it('is the person with standing memberships and their sites, in one statement', async () => {
    const [coordinator] = team.coordinators;
    const { id } = await begin(coordinator.email);
    const query = vi.spyOn(sequelize(), 'query');
    const reader = await sessionReader(id, Date.now());
    expect(query).toHaveBeenCalledTimes(1);
    query.mockRestore();
    expect(reader).toMatchObject({
      personId: coordinator.personId,
      email: coordinator.email,
      isAdministrator: false,
      installationKind: 'test',
      memberships: [{ trialCode: code, role: 'coordinator', siteIds: [team.sites[0]] }],
    });
    expect(JSON.stringify(reader)).not.toMatch(/argon2/);
  });

  it('of an administrator holds no membership', async () => {
    const { id } = await begin('admin@example.org');
    expect(await sessionReader(id, Date.now())).toMatchObject({ isAdministrator: true, memberships: [] });
  });

  it('is found by the digest of the secret value alone, which is stored nowhere', async () => {
    const { token, id } = await begin(team.sponsor.email);
    expect(await sessionReader(token, Date.now())).toBeNull();
    expect(await models().Session.findByPk(id)).not.toBeNull();
    expect(await models().Session.findByPk(token)).toBeNull();
    for (const guess of ['', '0'.repeat(64), "' OR 1=1 -- ", id.toUpperCase()]) {
      expect(await sessionReader(guess, Date.now())).toBeNull();
    }
  });

  it('sees a membership that was ended at the next request', async () => {
    const person = await makeActive(administrator);
    const played = await playTeam();
    await played.trial.run(team.administrator, 'grant-membership', {
      personId: person.personId,
      role: 'monitor',
    });
    const { id } = await begin(person.email);
    expect((await sessionReader(id, Date.now()))?.memberships).toHaveLength(1);
    await played.trial.run(team.administrator, 'end-membership', { personId: person.personId });
    expect((await sessionReader(id, Date.now()))?.memberships).toEqual([]);
  });

  it('has the test clock in `now` alone: the session’s own times follow the server’s clock', async () => {
    const { id } = await begin(team.sponsor.email);
    const now = Date.now();
    const offset = 40 * 86_400_000;
    await database.asOwner((owner) =>
      owner.query('UPDATE installation SET clock_offset_milliseconds = ?', [offset]),
    );
    const reader = await sessionReader(id, now);
    await database.asOwner((owner) => owner.query('UPDATE installation SET clock_offset_milliseconds = 0'));
    expect(reader?.now).toBe(new Date(now + offset).toISOString());
    expect(Date.parse(reader?.sessionEndsAt ?? '')).toBeLessThanOrEqual(now + IDLE_MS);
  });
});

describe('a session ends', () => {
  const START = Date.now();
  const at = (time: number) => () => time;

  it('after 30 minutes without use, and is prolonged by use', async () => {
    const { id } = await begin(team.sponsor.email, at(START));
    expect(await sessionReader(id, START + IDLE_MS - 1)).not.toBeNull();
    expect(await sessionReader(id, START + IDLE_MS)).toBeNull();
    await touchSession(id, at(START + IDLE_MS - 1));
    expect(await sessionReader(id, START + IDLE_MS)).not.toBeNull();
  });

  it('after 12 hours whatever its use', async () => {
    const { id } = await begin(team.sponsor.email, at(START));
    const end = START + LONGEST_SESSION_MS;
    await touchSession(id, at(end - 1));
    expect(await sessionReader(id, end - 1)).not.toBeNull();
    expect(await sessionReader(id, end)).toBeNull();
  });

  it('when the person signs out, and is not revived by use', async () => {
    const { id } = await begin(team.sponsor.email);
    await endSession(id);
    await touchSession(id, at(Date.now() + 90_000));
    expect(await sessionReader(id, Date.now())).toBeNull();
    expect((await models().Session.findByPk(id))?.endedAt).not.toBeNull();
  });

  it('at the very next request when the account is disabled (OWASP ASVS 5.0, 7.4.2)', async () => {
    const person = await makeActive(administrator);
    const { id } = await begin(person.email);
    expect(await sessionReader(id, Date.now())).not.toBeNull();
    await disablePerson(requestOf(administrator), { personId: person.personId });
    expect(await sessionReader(id, Date.now())).toBeNull();
    await expect(claim(person.email)).rejects.toMatchObject({ code: 'wrong-credentials' });
  });

  it('when a new password is set by a link', async () => {
    const person = await makeActive(administrator);
    const { id } = await begin(person.email);
    await resetByAdministrator(requestOf(administrator), { personId: person.personId });
    expect(await sessionReader(id, Date.now())).not.toBeNull();
    const token = await tokenMailedTo(person.personId);
    await acceptLink({ submissionKey: newId() }, { token, password: 'another gravel lantern' });
    expect(await sessionReader(id, Date.now())).toBeNull();
  });
});

describe('beginning a session', () => {
  it('is refused when the password was changed, or the account disabled, since it was proven', async () => {
    const person = await makeActive(administrator);
    const identity = await claim(person.email);
    await expect(startSession({ ...identity, passwordHash: 'another' })).rejects.toMatchObject({
      code: 'wrong-credentials',
    });
    await disablePerson(requestOf(administrator), { personId: person.personId });
    await expect(startSession(identity)).rejects.toMatchObject({ code: 'wrong-credentials' });
    expect(await models().Session.count({ where: { personId: person.personId } })).toBe(0);
  });

  it('gives each sign-in a value of its own, and clears away those long gone', async () => {
    const person = await makeActive(administrator);
    const old = await begin(person.email, () => Date.now() - 40 * 86_400_000);
    const [one, other] = [await begin(person.email), await begin(person.email)];
    expect(one.token).not.toBe(other.token);
    expect(await models().Session.findByPk(old.id)).toBeNull();
    expect(await ownSessions(person.personId, Date.now())).toHaveLength(2);
  });
});

describe('one’s own sessions', () => {
  it('can be ended one by one; those of others do not exist', async () => {
    const person = await makeActive(administrator);
    const [mine, alsoMine] = [await begin(person.email), await begin(person.email)];
    const theirs = await begin(team.sponsor.email);
    await endOwnSession(person.personId, alsoMine.id);
    expect((await ownSessions(person.personId, Date.now())).map(({ id }) => id)).toEqual([mine.id]);
    await expect(endOwnSession(person.personId, theirs.id)).rejects.toMatchObject({ code: 'not-found' });
    await expect(endOwnSession(person.personId, '0'.repeat(64))).rejects.toMatchObject({ code: 'not-found' });
    expect(await sessionReader(theirs.id, Date.now())).not.toBeNull();
  });
});

describe('changing one’s own password', () => {
  const change = async (person: { personId: string; email: string }, sessionId: string, passwords: object) =>
    changePassword({
      ...person,
      printedName: 'Ines Quarry',
      sessionId,
      clientAddress: '192.0.2.1',
      currentPassword: TEST_PASSWORD,
      newPassword: 'another gravel lantern',
      ...passwords,
    });

  it('ends the other sessions, keeps this one, and stands in the trail', async () => {
    const person = await makeActive(administrator);
    const [here, elsewhere] = [await begin(person.email), await begin(person.email)];
    await change(person, here.id, {});
    expect(await sessionReader(here.id, Date.now())).not.toBeNull();
    expect(await sessionReader(elsewhere.id, Date.now())).toBeNull();
    await expect(claim(person.email)).rejects.toMatchObject({ code: 'wrong-credentials' });
    await expect(claim(person.email, 'another gravel lantern')).resolves.toMatchObject({
      personId: person.personId,
    });
    const [event] = await models().Event.findAll({
      where: { chain: 'installation' },
      order: [['sequence', 'DESC']],
      limit: 1,
    });
    expect(event).toMatchObject({
      kind: 'password-changed',
      personId: person.personId,
      role: 'account-holder',
    });
    expect(await verifyStoredChain('installation')).toMatchObject({ firstBreak: null });
  });

  it.each([
    [{ currentPassword: 'not the present one' }, 'currentPassword'],
    [{ newPassword: TEST_PASSWORD }, 'newPassword'],
    [{ newPassword: 'Ines-Quarry-12' }, 'newPassword'],
  ])('refuses %j at its field, and changes nothing', async (passwords, field) => {
    const person = await makeActive(administrator);
    const { id } = await begin(person.email);
    const refused = { code: 'invalid', fields: { [field]: expect.any(String) as string } };
    await expect(change(person, id, passwords)).rejects.toMatchObject(refused);
    await expect(claim(person.email)).resolves.toMatchObject({ personId: person.personId });
  });
});
