import { beforeAll, describe, expect, it } from 'vitest';
import { proveIdentity } from '@/lib/commands/prove-identity';
import { runTrialCommand } from '@/lib/commands/run-trial-command';
import { type TrialEvent, trialEventSchema } from '@/lib/conduct/events';
import { replay } from '@/lib/conduct/evolve';
import { awaitingRecommendation, currentCohort } from '@/lib/conduct/trial-facts';
import { models } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { newId } from '@/lib/hash';
import { loadTrialState } from '@/lib/queries/load-trial-state';
import { verifyStoredChain } from '@/lib/queries/verify-chain';
import { trialInputSchemas } from '@/lib/schemas/trial-inputs';
import type { Player, TrialPlay } from '@/scripts/demo/play-trial';
import { playCohort, playDosed, playOpened, playTeam } from '../factories/played-trial';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});

const trialId = async (trial: TrialPlay) => (await trial.loaded()).state.trial.id;

async function eventsOf(id: string): Promise<TrialEvent[]> {
  const events = await models().Event.findAll({ where: { chain: id }, order: [['sequence', 'ASC']] });
  const payloads = await models().EventPayload.findAll({ where: { eventId: events.map((each) => each.id) } });
  const byEvent = new Map(payloads.map((each) => [each.eventId, each.payload]));
  return events.map((event) => ({
    occurredAt: event.occurredAt.toISOString(),
    personId: event.personId,
    role: event.role,
    payload: trialEventSchema.parse(JSON.parse(byEvent.get(event.id) ?? 'null')),
  }));
}

const countOf = async (id: string, kind: string) =>
  (await eventsOf(id)).filter((event) => event.payload.kind === kind).length;

const settled = (results: readonly PromiseSettledResult<unknown>[]) =>
  results.map((result) =>
    result.status === 'fulfilled' ? 'done' : (result.reason as { code?: string }).code,
  );

describe('a trial in the tables', () => {
  it('is exactly what its trail says, and the trail verifies', async () => {
    const { trial, team } = await playOpened();
    await playCohort(trial, team, 0);
    await trial.release(team.reviewers.slice(0, 2));
    await playCohort(trial, team, 1);
    await trial.release(team.reviewers.slice(1), { dose: '10', reason: 'One more cohort at 10 mg first.' });
    await trial.run(team.coordinators[0], 'halt-trial', { reason: 'A serious event, cause not known yet.' });
    const id = await trialId(trial);
    const { state } = await loadTrialState(id, { withTexts: true });
    expect(replay(await eventsOf(id))).toEqual(state);
    expect(await verifyStoredChain(id)).toMatchObject({ firstBreak: null });
  });

  it('names the event that was changed by one who could', async () => {
    const { trial } = await playTeam();
    const id = await trialId(trial);
    await database.asOwner(async (owner) => {
      await owner.query('DROP TRIGGER event_payloads_refuse_update');
      const [second] = (await owner.query('SELECT id FROM events WHERE chain = ? AND sequence = 2', [
        id,
      ])) as {
        id: string;
      }[];
      await owner.query(
        "UPDATE event_payloads SET payload = REPLACE(payload, 'statistician', 'reviewer') WHERE event_id = ?",
        [second?.id],
      );
      await owner.query(
        "CREATE TRIGGER event_payloads_refuse_update BEFORE UPDATE ON event_payloads FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'The trail is append-only.'",
      );
    });
    expect(await verifyStoredChain(id)).toMatchObject({
      firstBreak: { sequence: 2, reason: 'payload-differs' },
    });
  });
});

describe('at the same moment', () => {
  it('the last two outcomes compute one recommendation', async () => {
    for (let round = 0; round < 5; round += 1) {
      const { trial, team } = await playOpened();
      const [first, second, third] = await playDosed(trial, team);
      const record = (player: Player, subjectId: string | undefined) =>
        trial.run(player, 'record-outcome', { subjectId: subjectId ?? '', outcome: 'absent' });
      await record(team.coordinators[0], first);
      await Promise.all([record(team.coordinators[0], second), record(team.coordinators[1], third)]);
      const id = await trialId(trial);
      expect(await models().Recommendation.count({ where: { trialId: id, number: 2 } })).toBe(1);
      expect(await countOf(id, 'cohort-completed')).toBe(1);
      const mails = await models().OutboxMail.findAll({ where: { kind: 'recommendation-ready' } });
      const ofCohort = mails.filter((mail) => {
        const payload = JSON.parse(mail.payload) as { trialCode: string; afterCohort: number | null };
        return payload.trialCode === trial.code && payload.afterCohort === 1;
      });
      expect(ofCohort).toHaveLength(3);
    }
  });

  it('two reviewers release one dose, and a third is told', async () => {
    const { trial, team } = await playOpened();
    await playCohort(trial, team, 0);
    const awaiting = awaitingRecommendation((await trial.loaded()).state);
    const sign = (player: Player) =>
      trial.run(
        player,
        'sign-recommendation',
        {
          recommendationId: awaiting?.id ?? '',
          seenDigest: awaiting?.digest ?? '',
          decision: 'release',
          dose: awaiting?.dose ?? '',
        },
        { signs: true },
      );
    const answers = settled(await Promise.allSettled(team.reviewers.map(sign)));
    expect(answers.sort()).toEqual(['conflict', 'done', 'done']);
    const id = await trialId(trial);
    expect(await models().Release.count({ where: { trialId: id, cohortNumber: 2 } })).toBe(1);
    expect(await models().Cohort.count({ where: { trialId: id, number: 2 } })).toBe(1);
    expect(await countOf(id, 'dose-released')).toBe(2);
  });

  it('a double click records once and answers twice the same', async () => {
    const { trial, team } = await playOpened();
    const [subjectId] = await playDosed(trial, team);
    const submissionKey = newId();
    const input = trialInputSchemas['record-outcome'].parse({ subjectId, outcome: 'absent' });
    const click = () =>
      runTrialCommand({
        personId: team.coordinators[0].personId,
        trialCode: trial.code,
        command: { type: 'record-outcome', input },
        submissionKey,
        clock: () => trial.now,
      });
    const [first, second] = await Promise.all([click(), click()]);
    expect(second).toEqual(first);
    expect(await click()).toEqual(first);
    expect(await countOf(await trialId(trial), 'outcome-recorded')).toBe(1);
  });

  it('the last place of a cohort goes to one of two sites', async () => {
    const { trial, team } = await playOpened();
    const cohort = currentCohort((await trial.loaded()).state);
    const reserve = (site: 0 | 1, code: string) =>
      trial.run(team.coordinators[site], 'reserve-slot', {
        cohortId: cohort?.id ?? '',
        siteId: team.sites[site],
        code,
      });
    await reserve(0, 'AB-90001');
    await reserve(0, 'AB-90002');
    const answers = settled(
      await Promise.allSettled([
        reserve(0, 'AB-90003'),
        reserve(1, 'AB-90004'),
        reserve(1, 'AB-90005'),
        reserve(0, 'AB-90006'),
      ]),
    );
    expect(answers.filter((answer) => answer === 'done')).toHaveLength(1);
    expect(await models().Subject.count({ where: { cohortId: cohort?.id ?? '' } })).toBe(3);
  });
});

describe('what the database itself refuses, with the rights of the application', () => {
  let trial: TrialPlay;
  beforeAll(async () => {
    const opened = await playOpened();
    trial = opened.trial;
    await playCohort(trial, opened.team, 0);
  });

  const refused = async (work: () => Promise<unknown>) => {
    const error: unknown = await inTransaction(work).then(
      () => null,
      (reason: unknown) => reason,
    );
    if (!(error instanceof Error)) throw new Error('The database took it.');
    return error;
  };

  it('a release above the recommended dose, also with a forged recommended dose', async () => {
    const { state } = await trial.loaded();
    const awaiting = awaitingRecommendation(state);
    const forged = (recommendedDose: string, dose: string) => ({
      id: newId(),
      trialId: state.trial.id,
      cohortNumber: 2,
      recommendationId: awaiting?.id ?? '',
      recommendedDose,
      dose,
      releasedAt: new Date(),
    });
    expect(awaiting?.dose).toBe('20');
    const { Release } = models();
    expect((await refused(() => Release.create(forged('20', '20.0000000001')))).name).toMatch(/Database/);
    expect((await refused(() => Release.create(forged('40', '40')))).name).toMatch(/ForeignKey/);
    await inTransaction(async (transaction) => {
      await Release.create(forged('20', '20'));
      await transaction.rollback();
    }).catch((error: unknown) => {
      // The honest row is taken; rolling back by hand ends the wrapper's own commit.
      expect(String(error)).toMatch(/commit/i);
    });
  });

  it('changing or deleting an event or a payload', async () => {
    const id = (await trial.loaded()).state.trial.id;
    const { Event, EventPayload } = models();
    const [event] = await Event.findAll({ where: { chain: id }, limit: 1 });
    await refused(() => Event.update({ kind: 'nothing' }, { where: { id: event?.id } }));
    await refused(() => Event.destroy({ where: { id: event?.id } }));
    await refused(() => EventPayload.update({ payload: '{}' }, { where: { eventId: event?.id } }));
    await refused(() => EventPayload.destroy({ where: { eventId: event?.id } }));
    await database.asOwner(async (owner) => {
      await expect(owner.query('DELETE FROM events WHERE chain = ?', [id])).rejects.toThrow(/append-only/);
      await expect(
        owner.query('UPDATE event_payloads SET payload = ? WHERE event_id = ?', ['{}', event?.id]),
      ).rejects.toThrow(/append-only/);
    });
  });

  it('a second recommendation that waits, a changed dose of a cohort, a place beyond its size', async () => {
    const { state } = await trial.loaded();
    const awaiting = awaitingRecommendation(state);
    const cohort = currentCohort(state);
    const { Cohort, Recommendation, Subject } = models();
    const stored = await Recommendation.findByPk(awaiting?.id, { raw: true });
    if (!stored || !cohort) throw new Error('The trial is not as played.');
    expect(
      (await refused(() => Recommendation.create({ ...stored, id: newId(), revision: 9 }))).name,
    ).toMatch(/Unique/);
    await refused(() => Cohort.update({ dose: '120' }, { where: { id: cohort.id } }));
    const subject = await Subject.findOne({ where: { cohortId: cohort.id }, raw: true });
    if (!subject) throw new Error('The cohort is empty.');
    const beyond = { ...subject, id: newId(), code: 'AB-77777', place: cohort.size + 1 };
    expect((await refused(() => Subject.create(beyond))).message).toMatch(/never_more_subjects_than_places/);
  });
});

describe('who may not', () => {
  it('each command refuses the wrong role and the right role elsewhere, and leaves no event', async () => {
    const { trial, team } = await playOpened();
    const other = await playOpened();
    await playCohort(trial, team, 0);
    const id = await trialId(trial);
    const { state } = await trial.loaded();
    const awaiting = awaitingRecommendation(state);
    const cohort = currentCohort(state);
    const subject = Object.values(state.subjects).find((each) => each.siteId === team.sites[0]);
    const subjectId = subject?.id ?? '';
    const before = (await eventsOf(id)).length;
    const reason = 'A reason long enough to be one.';
    const version = Object.values(state.designVersions)[0];
    const sign = {
      recommendationId: awaiting?.id ?? '',
      seenDigest: awaiting?.digest ?? '',
      decision: 'release',
      dose: '10',
      reason,
    } as const;
    const [reviewer] = team.reviewers;
    const [coordinator, colleague] = team.coordinators;
    const stranger = other.team.coordinators[0];
    const signs = { signs: true };
    const attempts: (() => Promise<void>)[] = [
      () => trial.run(reviewer, 'record-outcome', { subjectId, outcome: 'absent' }),
      () => trial.run(colleague, 'release-slot', { subjectId, reason }),
      () => trial.run(stranger, 'record-outcome', { subjectId, outcome: 'absent' }),
      () =>
        trial.run(stranger, 'reserve-slot', {
          cohortId: cohort?.id ?? '',
          siteId: team.sites[0],
          code: 'AB-1234',
        }),
      () =>
        trial.run(team.sponsor, 'reserve-slot', {
          cohortId: cohort?.id ?? '',
          siteId: team.sites[0],
          code: 'AB-1234',
        }),
      () => trial.run(coordinator, 'sign-recommendation', sign, signs),
      () => trial.run(team.sponsor, 'sign-recommendation', sign, signs),
      () => trial.run(other.team.reviewers[0], 'sign-recommendation', sign, signs),
      () => trial.run(reviewer, 'sign-recommendation', sign),
      () => trial.run(coordinator, 'submit-design', { versionId: version?.id ?? '' }),
      () => trial.run(reviewer, 'grant-membership', { personId: stranger.personId, role: 'sponsor' }),
      () => trial.run(team.administrator, 'halt-trial', { reason }),
      () => trial.run(stranger, 'halt-trial', { reason }),
    ];
    for (const attempt of attempts) {
      await expect(attempt()).rejects.toMatchObject({ name: 'RefusedError' });
    }
    expect((await eventsOf(id)).length).toBe(before);
  });

  it('a signature needs the signer’s own password, and a changed password ends one under way', async () => {
    const { trial, team } = await playOpened();
    await playCohort(trial, team, 0);
    const awaiting = awaitingRecommendation((await trial.loaded()).state);
    const [first, second] = team.reviewers;
    const identity = await proveIdentity({
      email: first.email,
      password: first.password,
      purpose: 'signature',
      clientAddress: '127.0.0.1',
      expectedPersonId: first.personId,
    });
    const input = trialInputSchemas['sign-recommendation'].parse({
      recommendationId: awaiting?.id,
      seenDigest: awaiting?.digest,
      decision: 'release',
      dose: awaiting?.dose,
    });
    const request = {
      trialCode: trial.code,
      command: { type: 'sign-recommendation', input } as const,
      submissionKey: newId(),
      clock: () => trial.now,
    };
    await expect(runTrialCommand({ ...request, personId: second.personId, identity })).rejects.toMatchObject({
      code: 'wrong-credentials',
    });
    const changed = { ...identity, passwordHash: 'another' };
    await expect(
      runTrialCommand({ ...request, personId: first.personId, identity: changed }),
    ).rejects.toMatchObject({ code: 'conflict' });
    await expect(runTrialCommand({ ...request, personId: first.personId, identity })).resolves.toMatchObject({
      events: ['signed'],
    });
  });
});
