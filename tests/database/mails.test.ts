import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { resetByAdministrator } from '@/lib/commands/installation/password-reset';
import { models } from '@/lib/db/connection';
import { caughtMail, caughtMails } from '@/lib/queries/caught-mails';
import { causeStillHolds } from '@/lib/queries/cause-still-holds';
import { parseMailPayload } from '@/lib/schemas/mail-payloads';
import { deliverNextMail } from '@/lib/worker/deliver-mail';
import { startMailCatcher } from '@/lib/worker/mail-catcher';
import { mailContent } from '@/lib/worker/mail-content';
import { mailSender } from '@/lib/worker/send';
import type { Player, TrialPlay } from '@/scripts/demo/play-trial';
import { requestOf } from '../factories/installation';
import { playCohort, playDosed, playedDesign, playOpened, playTeam } from '../factories/played-trial';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
beforeEach(() =>
  database.asOwner(async (owner) => {
    await owner.query('DELETE FROM outbox');
    await owner.query('DELETE FROM caught_mails');
  }),
);

/** The queued mails of a kind about a trial, oldest first, each with whether it would be sent now. */
async function queued(trial: TrialPlay, kind: string) {
  const rows = await models().OutboxMail.findAll({
    where: { kind, state: 'queued' },
    order: [['createdAt', 'ASC']],
  });
  const mails = rows.map((row) => ({ ...row.get(), payload: JSON.parse(row.payload) as unknown }));
  const about = mails.filter(({ payload }) => (payload as { trialCode?: string }).trialCode === trial.code);
  return Promise.all(about.map(async (mail) => ({ ...mail, holds: await causeStillHolds(mail) })));
}
const holds = async (trial: TrialPlay, kind: string): Promise<boolean[]> =>
  (await queued(trial, kind)).map((mail) => mail.holds);
const readers = async (trial: TrialPlay, kind: string): Promise<string[]> =>
  (await queued(trial, kind)).map((mail) => mail.personId ?? '').sort();
const ids = (...players: readonly Player[]): string[] => players.map(({ personId }) => personId).sort();

async function awaitingOf(trial: TrialPlay) {
  const { state } = await trial.loaded();
  const awaiting = Object.values(state.recommendations).find((each) => each.state === 'awaiting');
  if (!awaiting) throw new Error('No recommendation waits.');
  return awaiting;
}

async function returnPacket(trial: TrialPlay, reviewer: Player): Promise<void> {
  const { id, digest } = await awaitingOf(trial);
  await trial.run(
    reviewer,
    'sign-recommendation',
    { recommendationId: id, seenDigest: digest, decision: 'return', reason: 'Please check the dates.' },
    { signs: true },
  );
}

describe('a mail goes out only while its cause holds', () => {
  it('a submitted design: until it is returned, and again only for the new submission', async () => {
    const { trial, team } = await playTeam();
    await trial.run(team.statistician, 'save-design', { design: playedDesign });
    const versionId = Object.keys((await trial.loaded()).state.designVersions)[0] ?? '';
    await trial.run(team.statistician, 'submit-design', { versionId });
    expect(await readers(trial, 'design-submitted')).toEqual(ids(...team.reviewers));
    expect(await holds(trial, 'design-submitted')).toEqual([true, true, true]);
    trial.pass(60_000);
    await trial.run(team.reviewers[0], 'return-design', { versionId, reason: 'The target is missing.' });
    expect(await holds(trial, 'design-submitted')).toEqual([false, false, false]);
    expect(await readers(trial, 'design-returned')).toEqual(ids(team.statistician));
    expect(await holds(trial, 'design-returned')).toEqual([true]);
    trial.pass(60_000);
    await trial.run(team.statistician, 'submit-design', { versionId });
    expect(await holds(trial, 'design-submitted')).toEqual([false, false, false, true, true, true]);
    expect(await holds(trial, 'design-returned')).toEqual([false]);
  });

  it('a dose letter: while its cohort is open, not once it is complete; a packet: while it waits', async () => {
    const { trial, team } = await playOpened();
    expect(await holds(trial, 'recommendation-ready')).toEqual([false, false, false]);
    expect(await readers(trial, 'dose-released')).toEqual(ids(...team.coordinators));
    expect(await holds(trial, 'dose-released')).toEqual([true, true]);
    expect(await readers(trial, 'dose-released-summary')).toEqual(ids(team.sponsor));
    await playCohort(trial, team, 0);
    expect(await holds(trial, 'dose-released')).toEqual([false, false]);
    expect(await holds(trial, 'dose-released-summary')).toEqual([true]);
    expect((await holds(trial, 'recommendation-ready')).slice(3)).toEqual([true, true, true]);
    await trial.release(team.reviewers.slice(0, 2));
    expect(await holds(trial, 'dose-released')).toEqual([false, false, true, true]);
    expect(await holds(trial, 'dose-released-summary')).toEqual([false, true]);
  });

  it('a returned packet: until it is resubmitted; its cohort takes nobody, so its letter is overtaken', async () => {
    const { trial, team } = await playOpened();
    await playCohort(trial, team, 0);
    await returnPacket(trial, team.reviewers[2]);
    expect(await readers(trial, 'packet-returned')).toEqual(ids(...team.coordinators));
    expect(await holds(trial, 'packet-returned')).toEqual([true, true]);
    expect(await holds(trial, 'dose-released')).toEqual([false, false]);
    const cohortId = Object.keys((await trial.loaded()).state.cohorts)[0] ?? '';
    await trial.run(team.coordinators[0], 'resubmit-cohort', { cohortId });
    expect(await holds(trial, 'packet-returned')).toEqual([false, false]);
  });

  it('a returned starting dose: one mail to the statistician, not two', async () => {
    const { trial, team } = await playTeam();
    await trial.design(team.statistician, team.reviewers[0], playedDesign);
    await returnPacket(trial, team.reviewers[1]);
    expect(await queued(trial, 'packet-returned')).toEqual([]);
    expect(await readers(trial, 'design-returned')).toEqual(ids(team.statistician));
  });

  it('a halt: always, before everything else; it overtakes the letter, and its lifting is told', async () => {
    const { trial, team } = await playOpened();
    await playDosed(trial, team);
    await trial.run(team.coordinators[0], 'halt-trial', { reason: 'A serious event, cause not known.' });
    const everyone = ids(team.statistician, ...team.reviewers, ...team.coordinators, team.sponsor);
    expect(await readers(trial, 'trial-halted')).toEqual(everyone);
    expect((await queued(trial, 'trial-halted')).map(({ priority }) => priority)).toEqual(
      everyone.map(() => 0),
    );
    expect(await holds(trial, 'dose-released')).toEqual([false, false]);
    expect(await holds(trial, 'dose-released-summary')).toEqual([false]);
    const haltId = Object.keys((await trial.loaded()).state.halts)[0] ?? '';
    for (const reviewer of team.reviewers.slice(0, 2)) {
      const input = { haltId, plan: 'continue', reason: 'Judged not related.' } as const;
      await trial.run(reviewer, 'sign-lift', input, { signs: true });
    }
    expect(await readers(trial, 'trial-lifted')).toEqual(everyone);
    expect(new Set(await holds(trial, 'trial-lifted'))).toEqual(new Set([true]));
    expect(new Set(await holds(trial, 'trial-halted'))).toEqual(new Set([true]));
    await trial.run(team.sponsor, 'halt-trial', { reason: 'Once more, supply fault.' });
    expect(new Set(await holds(trial, 'trial-lifted'))).toEqual(new Set([false]));
  });

  it('a signed stop: told to everyone', async () => {
    const { trial, team } = await playOpened();
    await playCohort(trial, team, 3);
    const { id, digest } = await awaitingOf(trial);
    for (const reviewer of team.reviewers.slice(0, 2)) {
      const input = { recommendationId: id, seenDigest: digest, decision: 'stop', reason: 'Harm.' } as const;
      await trial.run(
        reviewer,
        'sign-recommendation',
        { ...input, reason: 'Too much harm.' },
        { signs: true },
      );
    }
    expect(await holds(trial, 'trial-closed')).toEqual(Array.from({ length: 7 }, () => true));
  });

  it('nothing of a trial goes to somebody who has left it, or whose account is disabled', async () => {
    const { trial, team } = await playOpened();
    const [first, second] = team.coordinators;
    await trial.run(team.administrator, 'end-membership', { personId: first.personId });
    await database.asOwner((owner) =>
      owner.query("UPDATE people SET state = 'disabled' WHERE id = ?", [second.personId]),
    );
    expect(await readers(trial, 'dose-released')).toEqual(ids(first, second));
    expect(await holds(trial, 'dose-released')).toEqual([false, false]);
    expect(await holds(trial, 'dose-released-summary')).toEqual([true]);
  });

  it('a link: until it is replaced, used or out of date', async () => {
    const { team } = await playTeam();
    const { administrator, sponsor } = team;
    const reset = async () => {
      await resetByAdministrator(requestOf(administrator.personId), { personId: sponsor.personId });
      const where = { kind: 'password-reset', state: 'queued' };
      const row = await models().OutboxMail.findOne({ where, rejectOnEmpty: true });
      return { ...row.get(), payload: JSON.parse(row.payload) as unknown };
    };
    const first = await reset();
    expect(await causeStillHolds(first)).toBe(true);
    const second = await reset();
    const both = () => Promise.all([causeStillHolds(first), causeStillHolds(second)]);
    expect(await both()).toEqual([false, true]);
    const setClock = (milliseconds: number) =>
      database.asOwner((owner) =>
        owner.query('UPDATE installation SET clock_offset_milliseconds = ? WHERE id = 1', [milliseconds]),
      );
    await setClock(23 * 3_600_000);
    expect(await both()).toEqual([false, true]);
    await setClock(25 * 3_600_000);
    expect(await both()).toEqual([false, false]);
    await setClock(0);
    await database.asOwner((owner) => owner.query('UPDATE one_time_links SET used_at = UTC_TIMESTAMP(3)'));
    expect(await both()).toEqual([false, false]);
  });
});

describe('what a trial mails', () => {
  it('holds no subject code, grade, outcome or typed text, and what overtakes nothing arrives', async () => {
    const { trial, team } = await playOpened();
    await playCohort(trial, team, 1);
    await returnPacket(trial, team.reviewers[2]);
    await trial.run(team.coordinators[0], 'halt-trial', { reason: 'A serious event, cause not known.' });
    const rows = await models().OutboxMail.findAll({ where: { state: 'queued' } });
    for (const row of rows) parseMailPayload(row.kind, JSON.parse(row.payload));
    expect(new Set(rows.map(({ kind }) => kind)).size).toBeGreaterThanOrEqual(7);

    const catcher = await startMailCatcher();
    const delivery = {
      owner: 'test',
      send: mailSender(catcher.smtpUrl, 'Stepwell <stepwell@localhost>'),
      ...mailContent,
    };
    while ((await deliverNextMail(delivery)) !== 'idle');
    await catcher.close();

    expect(await models().OutboxMail.count({ where: { state: ['queued', 'dead'] } })).toBe(0);
    const list = await caughtMails({ to: null, before: null });
    expect(
      list?.mails
        .map(({ subject }) => subject)
        .reverse()
        .slice(0, 7),
    ).toEqual(Array.from({ length: 7 }, () => `${trial.code} is halted: dose nobody`));
    const codes = Object.values((await trial.loaded()).state.subjects).map(({ code }) => code);
    expect(codes).toHaveLength(3);
    for (const { id } of list?.mails ?? []) {
      const mail = await caughtMail(id);
      for (const form of [mail?.subject, mail?.text, mail?.html]) {
        expect(form).toBeTruthy();
        for (const code of codes) expect(form).not.toContain(code);
        expect(form).not.toMatch(/serious event|check the dates|grade|absent|toxicity/i);
      }
    }
  });
});

describe('caught mails', () => {
  const keep = (to: string, subject: string) =>
    database.asOwner((owner) =>
      owner.query(
        `INSERT INTO caught_mails (received_at, envelope_to, subject, message_id, text, html)
         VALUES (UTC_TIMESTAMP(6), ?, ?, '<m@stepwell.invalid>', 'text', '<p>html</p>')`,
        [to, subject],
      ),
    );

  it('are listed newest first, by recipient, fifty at a time', async () => {
    for (let number = 1; number <= 52; number += 1) await keep('one@example.org', `Mail ${number}`);
    await keep('two@example.org', 'Other');
    const first = await caughtMails({ to: null, before: null });
    expect(first?.mails).toHaveLength(50);
    expect(first?.mails[0]).toMatchObject({ to: 'two@example.org', subject: 'Other' });
    expect(first?.recipients).toEqual([
      { address: 'two@example.org', count: 1 },
      { address: 'one@example.org', count: 52 },
    ]);
    const rest = await caughtMails({ to: null, before: first?.olderThan ?? null });
    expect(rest?.mails.map(({ subject }) => subject)).toEqual(['Mail 3', 'Mail 2', 'Mail 1']);
    expect(rest?.olderThan).toBeNull();
    const filtered = await caughtMails({ to: 'two@example.org', before: null });
    expect(filtered?.mails.map(({ subject }) => subject)).toEqual(['Other']);
    expect((await caughtMails({ to: `' OR 1=1 -- `, before: null }))?.mails).toEqual([]);
  });

  it('are none of anybody’s business in a production installation', async () => {
    await keep('one@example.org', 'Mail');
    const id = (await caughtMails({ to: null, before: null }))?.mails[0]?.id ?? 0;
    expect(await caughtMail(id)).toMatchObject({ subject: 'Mail', text: 'text', html: '<p>html</p>' });
    expect(await caughtMail(id + 1)).toBeNull();
    const become = (kind: string) =>
      database.asOwner((owner) => owner.query('UPDATE installation SET kind = ? WHERE id = 1', [kind]));
    await become('production');
    expect(await caughtMails({ to: null, before: null })).toBeNull();
    expect(await caughtMail(id)).toBeNull();
    await become('test');
  });
});
