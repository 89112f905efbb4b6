import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { FREE_FAILURES, LONGEST_PAUSE_MS } from '@/lib/auth/back-off';
import * as passwords from '@/lib/auth/passwords';
import { disablePerson } from '@/lib/commands/installation/disable-person';
import { type IdentityClaim, proveIdentity } from '@/lib/commands/prove-identity';
import { models } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import {
  makeActive,
  makeFirstAdministrator,
  makeInvited,
  requestOf,
  TEST_PASSWORD,
} from '../factories/installation';
import { createTestDatabase } from '../setup/database';

vi.mock('@/lib/auth/passwords', { spy: true });

let administrator: string;
let ines: { personId: string; email: string };
let oke: { personId: string; email: string };
let disabled: { personId: string; email: string };
let invited: { personId: string; email: string };

beforeAll(async () => {
  await createTestDatabase();
  administrator = await makeFirstAdministrator();
  ines = await makeActive(administrator, { email: 'ines@example.org' });
  oke = await makeActive(administrator, { email: 'oke@example.org' });
  disabled = await makeActive(administrator, { email: 'gone@example.org' });
  await disablePerson(requestOf(administrator), { personId: disabled.personId });
  invited = await makeInvited(administrator, { email: 'new@example.org' });
});

const HOUR = 3_600_000;
let now = Date.now();
beforeEach(async () => {
  // Each test begins two days later: no failure of an earlier one counts.
  now += 48 * HOUR;
  vi.mocked(passwords.passwordMatches).mockClear();
});

const prove = (claim: Partial<IdentityClaim>) =>
  proveIdentity({
    email: ines.email,
    password: TEST_PASSWORD,
    purpose: 'sign-in',
    clientAddress: '192.0.2.10',
    clock: () => now,
    ...claim,
  });
const wrong = (claim: Partial<IdentityClaim> = {}) =>
  expect(prove({ password: 'not the password', ...claim })).rejects.toMatchObject({
    code: 'wrong-credentials',
  });
const tooMany = (claim: Partial<IdentityClaim> = {}) =>
  expect(prove(claim)).rejects.toMatchObject({ code: 'too-many-attempts' });

describe('a right address and password', () => {
  it('prove who it is, however the address was typed', async () => {
    const { passwordHash } = await models().Person.findByPk(ines.personId, { rejectOnEmpty: true });
    expect(await prove({})).toEqual({ personId: ines.personId, passwordHash });
    expect(await prove({ email: '  INES@Example.ORG ' })).toMatchObject({ personId: ines.personId });
  });

  it('leave one row of a success behind, and none of a failure', async () => {
    const before = await models().SignInAttempt.count();
    await prove({});
    expect(await models().SignInAttempt.count()).toBe(before + 1);
    const [last] = await models().SignInAttempt.findAll({ order: [['id', 'DESC']], limit: 1 });
    expect(last).toMatchObject({ succeeded: true, purpose: 'sign-in', clientAddress: '192.0.2.10' });
    expect(last?.emailDigest).toMatch(/^[0-9a-f]{64}$/);
  });
});

describe('anything else', () => {
  it('is answered alike, after the same work (OWASP ASVS 5.0, 6.3.8)', async () => {
    const claims: Partial<IdentityClaim>[] = [
      { password: 'not the password' },
      { email: 'nobody@example.org' },
      { email: disabled.email },
      { email: invited.email },
      // The collation of the column takes these for the same; a person is not.
      { email: 'inés@example.org' },
      { email: 'ines@example.org\u200b' },
    ];
    const answers = [];
    for (const claim of claims) {
      const error: unknown = await prove(claim).catch((refused: unknown) => refused);
      answers.push({ ...(error as { refusal: object }).refusal });
    }
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
    expect(answers[0]).toMatchObject({ code: 'wrong-credentials' });
    expect(passwords.passwordMatches).toHaveBeenCalledTimes(claims.length);
  });

  it('is logged as a failure', async () => {
    const failures = () => models().SignInAttempt.count({ where: { succeeded: false } });
    const before = await failures();
    await wrong();
    expect(await failures()).toBe(before + 1);
  });
});

describe('a signature', () => {
  const signature = { purpose: 'signature', expectedPersonId: '' } as const;

  it('takes one’s own address and password', async () => {
    expect(await prove({ ...signature, expectedPersonId: ines.personId })).toMatchObject({
      personId: ines.personId,
    });
  });

  it('refuses another person’s, though they are right', async () => {
    await wrong({ ...signature, expectedPersonId: ines.personId, email: oke.email, password: TEST_PASSWORD });
  });
});

describe('the back-off', () => {
  const fail = async (times: number, claim: Partial<IdentityClaim> = {}) => {
    for (let attempt = 0; attempt < times; attempt += 1) {
      now += LONGEST_PAUSE_MS;
      await wrong(claim);
    }
  };

  it('costs nothing for the first failures, then pauses in which nothing is checked, then lets in', async () => {
    for (let attempt = 0; attempt < FREE_FAILURES.pair; attempt += 1) await wrong();
    vi.mocked(passwords.passwordMatches).mockClear();
    await tooMany();
    expect(passwords.passwordMatches).not.toHaveBeenCalled();
    now += 1_000;
    await expect(prove({})).resolves.toMatchObject({ personId: ines.personId });
    await wrong();
  });

  it('says when to try again', async () => {
    for (let attempt = 0; attempt < FREE_FAILURES.pair; attempt += 1) await wrong();
    await expect(prove({})).rejects.toMatchObject({
      retryAt: now + 1_000,
      message: expect.stringMatching(/Try again in 1 second; the account is not locked/) as string,
    });
  });

  it('is never longer than 15 minutes', async () => {
    await fail(20);
    await tooMany();
    now += LONGEST_PAUSE_MS - 1;
    await tooMany();
    now += 1;
    await prove({});
  });

  it('counts signatures and signing in together, and unknown addresses like known ones', async () => {
    const email = 'nobody@example.org';
    for (let attempt = 0; attempt < FREE_FAILURES.pair; attempt += 1) {
      await wrong({ email, purpose: attempt % 2 ? 'signature' : 'sign-in' });
    }
    await tooMany({ email });
  });

  it('counts guesses at one address from many clients, yet does not keep its owner out', async () => {
    await prove({ clientAddress: '198.51.100.1' });
    now += 1;
    for (let guess = 0; guess < FREE_FAILURES.address; guess += 1) {
      await wrong({ clientAddress: `203.0.113.${guess + 1}` });
    }
    await tooMany({ clientAddress: '203.0.113.200' });
    await expect(prove({ clientAddress: '198.51.100.1' })).resolves.toMatchObject({
      personId: ines.personId,
    });
  });

  it('counts guesses at many addresses from one client', async () => {
    const clientAddress = '203.0.113.77';
    for (let guess = 0; guess < FREE_FAILURES.client; guess += 1) {
      await wrong({ email: `guess${guess}@example.org`, clientAddress });
    }
    await tooMany({ email: 'another@example.org', clientAddress });
  });

  it('counts attempts made at the same moment', async () => {
    const clientAddress = '203.0.113.99';
    const attempts = await Promise.allSettled(
      Array.from({ length: 60 }, () =>
        prove({ email: 'many@example.org', password: 'guess', clientAddress }),
      ),
    );
    const codes = attempts.map((each) =>
      each.status === 'rejected' ? (each.reason as { code: string }).code : 'in',
    );
    expect(codes.filter((code) => code === 'too-many-attempts').length).toBeGreaterThanOrEqual(60 - 25);
    expect(codes).not.toContain('in');
  });
});

it('is not done inside a transaction', async () => {
  await expect(inTransaction(() => prove({}))).rejects.toThrow(/inside a transaction/);
});
