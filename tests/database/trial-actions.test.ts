import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { disablePerson } from '@/lib/commands/installation/disable-person';
import { models } from '@/lib/db/connection';
import type { ActionResult } from '@/lib/schemas/action-result';
import { designDefaults } from '@/lib/schemas/design-defaults';
import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import { runTrialAction } from '@/lib/server/action';
import { trialCommandRoute } from '@/lib/server/trial-command-route';
import { makeActive, requestOf, TEST_PASSWORD } from '../factories/installation';
import { playedDesign, playTeam } from '../factories/played-trial';
import { asWebServer, signedInAs, signedOut, submission, withSession } from '../factories/signed-in';
import { createTestDatabase } from '../setup/database';

vi.mock('next/headers', async () => (await import('../factories/signed-in')).nextHeaders());

type Played = Awaited<ReturnType<typeof playTeam>>;
let trial: Played['trial'];
let team: Played['team'];
let otherCode: string;

beforeAll(async () => {
  asWebServer();
  await createTestDatabase();
  ({ trial, team } = await playTeam());
  const other = await playTeam();
  otherCode = other.trial.code;
});
beforeEach(signedOut);

const save = (input: object = {}) =>
  runTrialAction('save-design', submission({ trialCode: trial.code, design: playedDesign, ...input }));
const halt = (trialCode: string) =>
  runTrialAction('halt-trial', submission({ trialCode, reason: 'Two serious events on one day.' }));
const events = async () => (await trial.loaded()).version;

describe('an action of a trial', () => {
  it('does nothing for a visitor, and says how to go on', async () => {
    const before = await events();
    expect(await save()).toMatchObject({ ok: false, code: 'signed-out' });
    expect(await events()).toBe(before);
  });

  it('does nothing for a forged, an ended and another installation’s cookie', async () => {
    await withSession('x'.repeat(43));
    expect(await save()).toMatchObject({ code: 'signed-out' });
    const token = await signedInAs(team.statistician.personId);
    await withSession(token, 'the secret of another installation, as long: 81');
    expect(await save()).toMatchObject({ code: 'signed-out' });
  });

  it('is out at the next request when the account is disabled', async () => {
    const person = await makeActive(team.administrator.personId);
    await signedInAs(person.personId);
    expect(await halt(trial.code)).toMatchObject({ code: 'not-found' });
    await disablePerson(requestOf(team.administrator.personId), { personId: person.personId });
    expect(await halt(trial.code)).toMatchObject({ code: 'signed-out' });
  });

  it('answers for another’s trial, and for one that does not exist, in the same words', async () => {
    await signedInAs(team.statistician.personId);
    const answers = [await save({ trialCode: otherCode }), await save({ trialCode: 'NONE-99' })];
    expect(answers[0]).toEqual(answers[1]);
    expect(answers[0]).toMatchObject({ ok: false, code: 'not-found' });
  });

  it('is refused to a wrong role', async () => {
    await signedInAs(team.coordinators[0].personId);
    const before = await events();
    expect(await save()).toMatchObject({ ok: false, code: 'forbidden' });
    expect(await events()).toBe(before);
  });

  it('records once what is sent twice with one key, one after the other and at the same moment', async () => {
    await signedInAs(team.statistician.personId);
    const before = await events();
    const form = submission({ trialCode: trial.code, design: playedDesign });
    const first = await runTrialAction('save-design', form);
    expect(first).toEqual({ ok: true, value: { events: ['design-saved'], trialState: 'draft' } });
    expect(await runTrialAction('save-design', form)).toEqual(first);
    expect(await events()).toBe(before + 1);

    const again = submission({ trialCode: trial.code, design: { ...playedDesign, target: 0.3 } });
    const answers = await Promise.all(Array.from({ length: 8 }, () => runTrialAction('save-design', again)));
    for (const answer of answers) expect(answer).toEqual(answers[0]);
    expect(answers[0]).toMatchObject({ ok: true });
    expect(await events()).toBe(before + 2);
  });

  it('names each refused field by its path, and records nothing', async () => {
    await signedInAs(team.statistician.personId);
    const before = await events();
    const design = {
      ...designDefaults('levels'),
      target: 1,
      doses: { kind: 'levels', levels: ['10', '10', 'NaN'] },
    };
    const answer = await save({ design });
    expect(answer).toMatchObject({ ok: false, code: 'invalid' });
    const fields = Object.keys(answer.ok ? {} : (answer.fields ?? {}));
    expect(fields).toContain('design.target');
    expect(fields.some((field) => field.startsWith('design.doses.levels.'))).toBe(true);
    expect(await events()).toBe(before);
  });

  const cyclic: Record<string, unknown> = { trialCode: 'TRY-1', submissionKey: randomUUID() };
  cyclic.design = cyclic;
  it.each<[string, unknown]>([
    ['nothing', undefined],
    ['null', null],
    ['a text', 'WELL-02'],
    ['a number', 1e309],
    ['a list', [{ trialCode: 'TRY-1' }]],
    ['a map', new Map([['trialCode', 'TRY-1']])],
    ['a date', new Date()],
    ['a promise', Promise.resolve({})],
    ['a form', new FormData()],
    ['an empty object', {}],
    [
      'an object of no prototype',
      Object.assign(Object.create(null) as object, { submissionKey: randomUUID() }),
    ],
    ['an own __proto__', JSON.parse(`{"__proto__":{"trialCode":"TRY-1"},"submissionKey":"${randomUUID()}"}`)],
    ['a cycle', cyclic],
    ['a key that is none', { trialCode: 'TRY-1', design: {}, submissionKey: '../../etc' }],
    ['a key of five megabytes', { trialCode: 'TRY-1', design: {}, submissionKey: 'x'.repeat(5_000_000) }],
    ['a trial code of five megabytes', submission({ trialCode: 'X'.repeat(5_000_000), design: {} })],
    ['a role beside', submission({ trialCode: 'TRY-1', design: playedDesign, role: 'reviewer' })],
    [
      'ten thousand levels',
      submission({
        trialCode: 'TRY-1',
        design: {
          ...playedDesign,
          doses: { kind: 'levels', levels: Array.from({ length: 10_000 }, (_, index) => String(index + 1)) },
        },
      }),
    ],
  ])('refuses %s without a fault of the server', async (_name, input) => {
    await signedInAs(team.statistician.personId);
    const before = await events();
    const answer: ActionResult<unknown> = await runTrialAction(
      'save-design',
      input as TrialFormInput<'save-design'>,
    );
    expect(answer).toMatchObject({ ok: false, code: 'invalid' });
    expect(await events()).toBe(before);
  });
});

describe('a signature', () => {
  async function submitted() {
    const { trial: fresh, team: members } = await playTeam();
    await fresh.run(members.statistician, 'save-design', { design: playedDesign });
    const { state } = await fresh.loaded();
    const version = Object.values(state.designVersions)[0];
    await fresh.run(members.statistician, 'submit-design', { versionId: version?.id ?? '' });
    const [reviewer, other] = members.reviewers;
    await signedInAs(reviewer.personId, `192.0.2.${Math.ceil(Math.random() * 200)}`);
    const approve = (credentials: object) =>
      runTrialAction(
        'approve-design',
        submission({
          trialCode: fresh.code,
          versionId: version?.id ?? '',
          seenDigest: version?.digest ?? '',
          email: reviewer.email,
          password: TEST_PASSWORD,
          ...credentials,
        }),
      );
    return { approve, reviewer, other, fresh };
  }

  it('is refused without address and password, each at its field', async () => {
    const { approve } = await submitted();
    const answer = await approve({ email: '', password: '' });
    expect(answer).toMatchObject({
      code: 'invalid',
      fields: { email: expect.any(String) as string, password: expect.any(String) as string },
    });
  });

  it('is refused with a wrong password, and with another reviewer’s right ones, in the same words', async () => {
    const { approve, other, fresh } = await submitted();
    const wrong = await approve({ password: 'not the password' });
    const others = await approve({ email: other.email });
    expect(wrong).toMatchObject({
      ok: false,
      code: 'wrong-credentials',
      fields: { password: expect.any(String) as string },
    });
    expect(others).toEqual(wrong);
    expect(Object.keys((await fresh.loaded()).state.signatures)).toHaveLength(0);
  });

  it('pauses after too many wrong passwords, while halting stays open', async () => {
    const { approve, fresh } = await submitted();
    for (let attempt = 0; attempt < 5; attempt += 1) await approve({ password: 'not the password' });
    expect(await approve({})).toMatchObject({ ok: false, code: 'too-many-attempts' });
    const answer = await halt(fresh.code);
    expect(answer.ok || answer.code).not.toBe('too-many-attempts');
  });

  it('with one’s own is recorded under one’s printed name, with a trail row', async () => {
    const { approve, reviewer, fresh } = await submitted();
    const before = (await fresh.loaded()).version;
    expect(await approve({ email: reviewer.email.toUpperCase() })).toMatchObject({ ok: true });
    const { state, version } = await fresh.loaded();
    expect(version).toBeGreaterThan(before);
    expect(Object.values(state.signatures)).toMatchObject([{ personId: reviewer.personId }]);
    const stored = await models().Submission.findAll({ where: { personId: reviewer.personId } });
    expect(JSON.stringify(stored)).not.toContain(TEST_PASSWORD);
  });
});

describe('the route of a command', () => {
  const post = (
    body: unknown,
    { type = 'save-design', code = '', origin = 'http://stepwell.example' } = {},
  ) =>
    trialCommandRoute(
      new Request(`http://stepwell.example/api/trials/${code || trial.code}/commands/${type}`, {
        method: 'POST',
        headers: origin ? { origin, host: 'stepwell.example' } : {},
        body: typeof body === 'string' ? body : JSON.stringify(body),
      }),
      { params: Promise.resolve({ code: code || trial.code, type }) },
    );
  const problem = async (response: Response) => {
    expect(response.headers.get('content-type')).toBe('application/problem+json');
    expect(response.headers.get('cache-control')).toBe('no-store');
    const details = (await response.json()) as { status: number; code: string };
    expect(details.status).toBe(response.status);
    return details;
  };

  it('runs the same command as the form, and answers a repeated key with the first answer', async () => {
    await signedInAs(team.statistician.personId);
    const form = submission({ design: { ...playedDesign, target: 0.2 } });
    const byForm = await runTrialAction('save-design', { ...form, trialCode: trial.code });
    const before = await events();
    const response = await post(form);
    expect(response.status).toBe(200);
    expect(response.headers.get('cache-control')).toBe('no-store');
    expect(byForm).toEqual({ ok: true, value: await response.json() });
    expect(await events()).toBe(before);
  });

  it('answers a visitor with 401', async () => {
    expect(await problem(await post(submission({ design: playedDesign })))).toMatchObject({
      status: 401,
      code: 'signed-out',
      type: 'about:blank',
      title: 'Unauthorized',
      instance: `/api/trials/${trial.code}/commands/save-design`,
    });
  });

  it.each([
    ['another site', 'http://elsewhere.example'],
    ['a page of no origin', 'null'],
    ['no page at all', ''],
  ])('refuses what %s asks for, with 403', async (_name, origin) => {
    await signedInAs(team.statistician.personId);
    const before = await events();
    expect(await problem(await post(submission({ design: playedDesign }), { origin }))).toMatchObject({
      status: 403,
      code: 'forbidden',
    });
    expect(await events()).toBe(before);
  });

  it.each(['constructor', '__proto__', 'toString', 'delete-everything', 'SAVE-DESIGN'])(
    'knows no command “%s”',
    async (type) => {
      await signedInAs(team.statistician.personId);
      expect(await problem(await post({}, { type }))).toMatchObject({ status: 404, code: 'not-found' });
    },
  );

  it('does not let the body name another trial', async () => {
    await signedInAs(team.statistician.personId);
    const body = submission({ design: playedDesign, trialCode: trial.code });
    expect(await problem(await post(body, { code: otherCode }))).toMatchObject({ status: 404 });
  });

  it.each(['', '{', 'null', '[]', '"text"', '1e309', '{"submissionKey":1}', `"${'x'.repeat(900_000)}"`])(
    'refuses the body %.20s with 422',
    async (body) => {
      await signedInAs(team.statistician.personId);
      expect(await problem(await post(body))).toMatchObject({ status: 422, code: 'invalid' });
    },
  );

  it('refuses a body over its limit with 413', async () => {
    await signedInAs(team.statistician.personId);
    expect(await problem(await post(`"${'x'.repeat(1_100_000)}"`))).toMatchObject({ status: 413 });
  });

  it('names the refused fields', async () => {
    await signedInAs(team.statistician.personId);
    const body = submission({ design: { ...playedDesign, target: 0 } });
    const details = await problem(await post(body));
    expect(details).toMatchObject({ status: 422, fields: { 'design.target': expect.any(String) as string } });
  });

  it('says when to try again after too many wrong passwords', async () => {
    await signedInAs(team.reviewers[2].personId, '192.0.2.222');
    const body = {
      versionId: randomUUID(),
      seenDigest: 'a'.repeat(64),
      email: team.reviewers[2].email,
      password: 'not the password',
    };
    for (let attempt = 0; attempt < 5; attempt += 1) {
      expect(await problem(await post(submission(body), { type: 'approve-design' }))).toMatchObject({
        status: 401,
      });
    }
    const response = await post(submission(body), { type: 'approve-design' });
    expect(Number(response.headers.get('retry-after'))).toBeGreaterThanOrEqual(1);
    expect(await problem(response)).toMatchObject({ status: 429, code: 'too-many-attempts' });
  });
});
