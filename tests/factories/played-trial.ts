import type { DesignInput } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { currentCohort, placesOf } from '@/lib/conduct/trial-facts';
import { DAY, HOUR, type Player, TrialPlay } from '@/scripts/demo/play-trial';
import { makeActive, makeFirstAdministrator, makeSite, makeTrial, TEST_PASSWORD } from './installation';

export interface PlayedTeam {
  readonly administrator: Player;
  readonly statistician: Player;
  readonly reviewers: readonly [Player, Player, Player];
  readonly coordinators: readonly [Player, Player];
  readonly sponsor: Player;
  readonly sites: readonly [string, string];
}

/** Robbins–Monro on six levels, ln scale, c = 4.5, fold cap 2, cohorts of 3, a window of 28 days. */
export const playedDesign: DesignInput = {
  ...designDefaults('levels'),
  rule: { name: 'robbins-monro', c: 4.5, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
};

let administrator: Player | null = null;

async function theAdministrator(): Promise<Player> {
  administrator ??= {
    personId: await makeFirstAdministrator(),
    email: 'admin@example.org',
    password: TEST_PASSWORD,
  };
  return administrator;
}

/** A trial with its whole team, in draft, in the test's database. */
export async function playTeam(): Promise<{ trial: TrialPlay; team: PlayedTeam }> {
  const admin = await theAdministrator();
  const player = async (): Promise<Player> => ({
    ...(await makeActive(admin.personId)),
    password: TEST_PASSWORD,
  });
  const { code, statisticianId } = await makeTrial(admin.personId);
  const trial = new TrialPlay(code, Date.now());
  const team: PlayedTeam = {
    administrator: admin,
    statistician: { personId: statisticianId, email: '', password: TEST_PASSWORD },
    reviewers: [await player(), await player(), await player()],
    coordinators: [await player(), await player()],
    sponsor: await player(),
    sites: [await makeSite(admin.personId), await makeSite(admin.personId)],
  };
  for (const siteId of team.sites) await trial.run(admin, 'add-site', { siteId });
  for (const { personId } of team.reviewers) {
    await trial.run(admin, 'grant-membership', { personId, role: 'reviewer' });
  }
  for (const [index, { personId }] of team.coordinators.entries()) {
    await trial.run(admin, 'grant-membership', {
      personId,
      role: 'coordinator',
      siteIds: [team.sites[index] ?? ''],
    });
  }
  await trial.run(admin, 'grant-membership', { personId: team.sponsor.personId, role: 'sponsor' });
  return { trial, team };
}

/** A trial with its first cohort open at 10 mg. */
export async function playOpened(design: DesignInput = playedDesign) {
  const { trial, team } = await playTeam();
  await trial.design(team.statistician, team.reviewers[0], design);
  await trial.release(team.reviewers.slice(0, 2));
  return { trial, team };
}

let serial = 0;

/** Reserves and doses the three places of the open cohort, two of the first site and one of the second; the windows end. */
export async function playDosed(trial: TrialPlay, team: PlayedTeam): Promise<string[]> {
  const { state } = await trial.loaded();
  const cohort = currentCohort(state);
  if (!cohort) throw new Error('No cohort is open.');
  for (const site of [0, 0, 1] as const) {
    serial += 1;
    const coordinator = team.coordinators[site];
    const code = `AB-${String(serial).padStart(4, '0')}`;
    await trial.run(coordinator, 'reserve-slot', { cohortId: cohort.id, siteId: team.sites[site], code });
    trial.pass(HOUR);
    const subject = placesOf((await trial.loaded()).state, cohort.id).find((each) => each.code === code);
    await trial.run(coordinator, 'record-dosing', {
      subjectId: subject?.id ?? '',
      dosedAt: new Date(trial.now).toISOString(),
      doseGiven: cohort.dose,
    });
  }
  trial.pass(29 * DAY);
  return placesOf((await trial.loaded()).state, cohort.id).map((subject) => subject.id);
}

/** Runs a whole cohort: the first `responses` subjects respond on day 3. */
export async function playCohort(trial: TrialPlay, team: PlayedTeam, responses: number): Promise<void> {
  const ids = await playDosed(trial, team);
  const { state } = await trial.loaded();
  for (const [index, subjectId] of ids.entries()) {
    const subject = state.subjects[subjectId];
    const site = team.sites.indexOf(subject?.siteId ?? '');
    const coordinator = team.coordinators[site === 1 ? 1 : 0];
    const isPresent = index < responses;
    await trial.run(coordinator, 'record-outcome', {
      subjectId,
      outcome: isPresent ? 'present' : 'absent',
      onsetAt: isPresent ? new Date(Date.parse(subject?.dosedAt ?? '') + 3 * DAY).toISOString() : null,
    });
  }
}
