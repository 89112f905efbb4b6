import { beforeAll, describe, expect, it } from 'vitest';
import { createTrial } from '@/lib/commands/installation/create-trial';
import { newId } from '@/lib/hash';
import type { TrialRole } from '@/lib/policy/roles';
import { cohortList } from '@/lib/queries/trial/cohort-list';
import { type CohortPageView, cohortPage } from '@/lib/queries/trial/cohort-page';
import type { TrialReader } from '@/lib/queries/trial/reader-trial';
import { team } from '@/lib/queries/trial/team';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { createDemoPeople, type DemoPeople, type DemoRole, type DemoSites } from '@/scripts/demo/people';
import { DAY, HOUR, type PlayedSubject, TrialPlay } from '@/scripts/demo/play-trial';
import { createTestDatabase } from '../setup/database';

/*
 * Two sites fill two cohorts. Cohort 1: Aldermoor's ALD-001 and ALD-002 without a response, the Valk Institute's VLK-003
 * with one. Then a lower dose than the recommended one is released for cohort 2, in which each site has a subject.
 */
const CODE = 'CUT-01';
let trial: TrialPlay;
let people: DemoPeople;
let sites: DemoSites;

const start = Date.parse('2027-01-04T08:00:00.000Z');
const played = (
  role: 'aldermoor' | 'valk',
  code: string,
  dosedAfter: number | undefined,
  outcome?: PlayedSubject['outcome'],
): PlayedSubject => ({
  coordinator: people[role],
  siteId: sites[role],
  code,
  reservedAfter: HOUR,
  ...(dosedAfter === undefined ? {} : { dosedAfter }),
  ...(outcome === undefined ? {} : { outcome }),
});

async function readerOf(role: DemoRole, change: Partial<TrialReader> = {}): Promise<TrialReader> {
  const { state } = await trial.loaded();
  const { personId } = people[role];
  const member = state.members[personId];
  return {
    personId,
    printedName: role,
    isAdministrator: role === 'administrator',
    memberships: member
      ? [{ trialId: state.trial.id, role: member.role satisfies TrialRole, siteIds: member.siteIds }]
      : [],
    now: new Date(trial.now).toISOString(),
    ...change,
  };
}

async function pageOf(role: DemoRole, number: string): Promise<CohortPageView> {
  const view = await cohortPage(await readerOf(role), CODE, number);
  if (view === null) throw new Error(`${role} sees no cohort ${number}.`);
  return view;
}

beforeAll(async () => {
  await createTestDatabase();
  ({ people, sites } = await createDemoPeople(start - DAY));
  const clock = () => start;
  await createTrial(
    { personId: people.administrator.personId, submissionKey: newId(), clock },
    { code: CODE, title: 'A trial of two sites', statisticianId: people.statistician.personId },
  );
  trial = new TrialPlay(CODE, start);
  for (const siteId of [sites.aldermoor, sites.valk]) {
    await trial.run(people.administrator, 'add-site', { siteId });
  }
  for (const role of ['aldermoor', 'valk'] as const) {
    await trial.run(people.administrator, 'grant-membership', {
      personId: people[role].personId,
      role: 'coordinator',
      siteIds: [sites[role]],
    });
  }
  for (const role of ['firstReviewer', 'secondReviewer'] as const) {
    await trial.run(people.administrator, 'grant-membership', {
      personId: people[role].personId,
      role: 'reviewer',
    });
  }
  await trial.run(people.administrator, 'grant-membership', {
    personId: people.sponsor.personId,
    role: 'sponsor',
  });
  await trial.design(people.statistician, people.firstReviewer, {
    ...designDefaults('levels'),
    startingDose: '20',
    rule: { name: 'robbins-monro', c: 6, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
  });
  const reviewers = [people.firstReviewer, people.secondReviewer];
  await trial.release(reviewers);
  await trial.cohort([
    played('aldermoor', 'ALD-001', 2 * DAY, 'absent'),
    played('aldermoor', 'ALD-002', 3 * DAY, 'absent'),
    played('valk', 'VLK-003', 4 * DAY, 'absent'),
  ]);
  trial.pass(DAY);
  await trial.release(reviewers, { dose: '10', reason: 'A late laboratory value is not yet explained.' });
  await trial.cohort([played('aldermoor', 'ALD-004', 2 * DAY), played('valk', 'VLK-005', 3 * DAY, 5 * DAY)]);
}, 120_000);

describe('a cohort as a coordinator reads it', () => {
  it('holds no code, outcome or date of another site, and no dose but the released one', async () => {
    const view = await pageOf('aldermoor', '2');
    const { state } = await trial.loaded();
    const text = JSON.stringify(view);
    expect(text).not.toMatch(/VLK|Valk/);
    expect(text).not.toContain('"present":1');
    for (const subject of Object.values(state.subjects).filter((each) => each.siteId === sites.valk)) {
      for (const secret of [
        subject.id,
        subject.code,
        subject.dosedAt,
        subject.windowEndsAt,
        subject.onsetAt,
      ]) {
        if (secret !== null) expect(text).not.toContain(secret);
      }
    }
    // The packet recommended 40 mg (twice the dose given, the cap on a rise); 10 mg was released.
    const recommended = Object.values(state.recommendations).find((row) => row.number === 2)?.dose;
    expect(recommended).toBe('40');
    expect(text).not.toMatch(/\b40\b/);
    expect(text).not.toContain('laboratory');
    expect(view.dose).toMatchObject({ text: '10 mg', recommendedText: null, designVersion: 1 });
    expect(view).toMatchObject({
      reads: 'own-sites',
      cohort: { placesTaken: 2, size: 3 },
      places: [
        { place: 1, holder: 'own', subject: { code: 'ALD-004', state: 'dosed' } },
        { place: 2, holder: 'another-site' },
        { place: 3, holder: 'nobody' },
      ],
    });
  });

  it('offers the acts that are possible, and says why the others are not', async () => {
    const view = await pageOf('aldermoor', '2');
    if (view.reads !== 'own-sites') throw new Error('A coordinator reads all.');
    expect(view.reserve).toMatchObject({ sites: [{ code: 'ALD' }], why: null });
    const [own] = view.places;
    if (own?.holder !== 'own') throw new Error('Place 1 is not Aldermoor’s.');
    expect(own.subject.acts.recordPresent).toEqual({ why: null });
    expect(own.subject.acts.recordAbsent?.why).toMatch(/window has not ended/);
    expect(view.resubmit).toBeNull();
  });

  it('has a list that counts, without responses', async () => {
    const list = await cohortList(await readerOf('aldermoor'), CODE);
    expect(list?.cohorts).toMatchObject([
      { number: 1, doseText: '20 mg', outcomesIn: 3, ownSubjects: 2, responses: null },
      { number: 2, doseText: '10 mg', placesTaken: 2, size: 3, ownSubjects: 1, responses: null },
    ]);
    expect(list?.presentLabel).toBeNull();
  });

  it('changes its revision with what is shown and not with the hour', async () => {
    const before = await pageOf('aldermoor', '2');
    trial.pass(HOUR);
    expect((await pageOf('aldermoor', '2')).revision).toBe(before.revision);
    await trial.run(people.aldermoor, 'reserve-slot', {
      cohortId: before.cohort.id,
      siteId: sites.aldermoor,
      code: 'ALD-006',
    });
    const after = await pageOf('aldermoor', '2');
    expect(after.revision).not.toBe(before.revision);
    const own = after.reads === 'own-sites' ? after.places[2] : undefined;
    if (own?.holder !== 'own') throw new Error('The place was not reserved.');
    await trial.run(people.aldermoor, 'release-slot', {
      subjectId: own.subject.id,
      reason: 'Screen failure: QT interval.',
    });
    expect((await pageOf('aldermoor', '2')).givenBack).toMatchObject([
      { code: 'ALD-006', reason: 'Screen failure: QT interval.' },
    ]);
    expect((await pageOf('valk', '2')).givenBack).toEqual([]);
  });
});

describe('a cohort as others read it', () => {
  it('is whole for a reviewer, with the recommended dose where a lower one was released', async () => {
    const view = await pageOf('firstReviewer', '2');
    expect(view).toMatchObject({
      reads: 'all',
      freePlaces: 1,
      dose: { text: '10 mg', recommendedText: '40 mg', signers: ['Dr Ines Maartens', 'Dr Oke Lindqvist'] },
      subjects: [
        { code: 'ALD-004', outcome: null },
        { code: 'VLK-005', outcome: 'present' },
      ],
    });
    const list = await cohortList(await readerOf('statistician'), CODE);
    expect(list?.cohorts.map((cohort) => cohort.responses)).toEqual([
      { present: 0, evaluable: 3 },
      { present: 1, evaluable: 1 },
    ]);
  });

  it('does not exist for a sponsor, an administrator, somebody without a role, or under another number', async () => {
    for (const role of ['sponsor', 'administrator', 'thirdReviewer'] as const) {
      expect(await cohortPage(await readerOf(role), CODE, '2'), role).toBeNull();
      expect(await cohortList(await readerOf(role), CODE), role).toBeNull();
    }
    const reader = await readerOf('aldermoor');
    for (const number of ['3', '0', '-1', '1e0', '02', ' 2', '2.0', '', '99999999999999999999', '２']) {
      expect(await cohortPage(reader, CODE, number), number).toBeNull();
    }
    expect(await cohortPage(reader, 'NONE-01', '2')).toBeNull();
  });
});

describe('a dose that is not for dosing now', () => {
  it('is said to be so to everyone while the trial is halted, and of a cohort that is signed', async () => {
    expect((await pageOf('firstReviewer', '2')).notForDosing).toBeNull();
    expect((await pageOf('firstReviewer', '1')).notForDosing).toBe('Cohort 1 is not open.');
    const before = await pageOf('valk', '2');
    await trial.run(people.secondReviewer, 'halt-trial', { reason: 'A serious event is looked into.' });
    for (const role of ['valk', 'aldermoor', 'firstReviewer', 'statistician'] as const) {
      expect((await pageOf(role, '2')).notForDosing, role).toMatch(/^The trial is halted/);
    }
    const after = await pageOf('valk', '2');
    expect(after.revision).not.toBe(before.revision);
    expect(after.reads === 'own-sites' && after.reserve?.why).toMatch(/^The trial is halted/);
  });
});

describe('the team', () => {
  it('shows names, roles and sites, no address, and who may sign', async () => {
    const view = await team(await readerOf('sponsor'), CODE);
    expect(JSON.stringify(view)).not.toMatch(/@|email/);
    expect(view?.quorum).toBe(2);
    expect(view?.members.map(({ printedName, roleName }) => `${printedName}: ${roleName}`)).toEqual([
      'Lena Okoro: Site coordinator',
      'Piet Varga: Site coordinator',
      'Dr Ines Maartens: Safety reviewer',
      'Dr Oke Lindqvist: Safety reviewer',
      'Jonas Abele: Statistician',
      'Carla Whitmore: Sponsor',
    ]);
    expect(view?.signers.every((signer) => signer.maySign)).toBe(true);
    expect(view?.sites).toMatchObject([
      { name: 'Aldermoor Hospital', state: 'active', timeZone: 'Europe/London' },
      { name: 'Valk Institute', state: 'active', timeZone: 'Europe/Amsterdam' },
    ]);
    expect(await team(await readerOf('administrator'), CODE)).toBeNull();
  });
});
