import { createTrial } from '@/lib/commands/installation/create-trial';
import { currentCohort, placesOf } from '@/lib/conduct/trial-facts';
import { newId } from '@/lib/hash';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { HOUR, TrialPlay } from '../demo/play-trial';
import type { BenchTeam } from './team';

/** Long enough ago for the longest trial played here, in milliseconds; the installation's chain may move it nearer. */
const BEGUN_BEFORE_MS = 8 * 24 * HOUR;
const MINUTE = HOUR / 60;

/** Told of each outcome as it was recorded. */
export type OutcomeListener = (milliseconds: number, isLast: boolean) => void;

let serial = 0;

/**
 * Opens a trial with the whole team: Robbins–Monro on six levels, observation windows of one hour, 30 cohorts at most; the
 * starting dose is released.
 */
export async function openBenchTrial(team: BenchTeam, code: string, cohortSize: number): Promise<TrialPlay> {
  const { administrator, statistician, sponsor } = team.players;
  const trial = new TrialPlay(code, Date.now() - BEGUN_BEFORE_MS);
  await createTrial(
    { personId: administrator.personId, submissionKey: newId(), clock: () => trial.now },
    { code, title: `A trial played to be measured (${code})`, statisticianId: statistician.personId },
  );
  for (const { siteId } of team.coordinators) await trial.run(administrator, 'add-site', { siteId });
  for (const { player, siteId } of team.coordinators) {
    const { personId } = player;
    await trial.run(administrator, 'grant-membership', { personId, role: 'coordinator', siteIds: [siteId] });
  }
  for (const { personId } of team.reviewers) {
    await trial.run(administrator, 'grant-membership', { personId, role: 'reviewer' });
  }
  await trial.run(administrator, 'grant-membership', { personId: sponsor.personId, role: 'sponsor' });
  const [approver] = team.reviewers;
  if (!approver) throw new Error('Nobody can approve the design.');
  await trial.design(statistician, approver, {
    ...designDefaults('levels'),
    rule: { name: 'robbins-monro', c: 4, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
    cohortSize,
    maximumCohorts: 30,
    stopping: { maximumSubjects: null, repeated: null, precision: null },
    observationWindow: { length: 1, unit: 'hours' },
  });
  await trial.release(team.reviewers.slice(0, 2));
  return trial;
}

/** Plays the open cohort to its last outcome: in every second cohort one subject responds. */
export async function playBenchCohort(
  trial: TrialPlay,
  team: BenchTeam,
  onOutcome: OutcomeListener = () => undefined,
): Promise<void> {
  const cohort = currentCohort((await trial.loaded()).state);
  if (!cohort) throw new Error(`No cohort of ${trial.code} is open.`);
  // No command happens before the last link of its chain, whatever the clock it brings.
  trial.now = Math.max(trial.now, Date.parse(cohort.openedAt));
  const places = Array.from({ length: cohort.size }, (_, index) => {
    const coordinator = team.coordinators[index % team.coordinators.length];
    if (!coordinator) throw new Error('Nobody can record.');
    serial += 1;
    return { ...coordinator, code: `${coordinator.siteCode}-${String(serial).padStart(5, '0')}` };
  });
  for (const { player, siteId, code } of places) {
    await trial.run(player, 'reserve-slot', { cohortId: cohort.id, siteId, code });
  }
  const subjects = placesOf((await trial.loaded()).state, cohort.id);
  const dosedAt = new Date(trial.now).toISOString();
  const recorded = places.map(({ player, code }) => {
    const subjectId = subjects.find((each) => each.code === code)?.id ?? '';
    return { player, subjectId };
  });
  for (const { player, subjectId } of recorded) {
    await trial.run(player, 'record-dosing', { subjectId, dosedAt, doseGiven: cohort.dose });
  }
  trial.pass(HOUR + MINUTE);
  for (const [index, { player, subjectId }] of recorded.entries()) {
    const isPresent = index === 0 && cohort.number % 2 === 0;
    const begun = performance.now();
    await trial.run(player, 'record-outcome', {
      subjectId,
      outcome: isPresent ? 'present' : 'absent',
      onsetAt: isPresent ? dosedAt : null,
    });
    onOutcome(performance.now() - begun, index === recorded.length - 1);
  }
  trial.pass(MINUTE);
}

/** Plays a trial of cohorts of three until the packet of its last cohort waits for the reviewers. */
export async function playUntilPacket(team: BenchTeam, code: string, cohorts: number): Promise<TrialPlay> {
  const trial = await openBenchTrial(team, code, 3);
  for (let number = 1; number <= cohorts; number += 1) {
    await playBenchCohort(trial, team);
    if (number < cohorts) await trial.release(team.reviewers.slice(0, 2));
  }
  return trial;
}
