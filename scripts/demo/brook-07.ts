import { createTrial } from '@/lib/commands/installation/create-trial';
import { newId } from '@/lib/hash';
import { designDefaults } from '@/lib/schemas/design-defaults';
import type { DemoPeople, DemoSites } from './people';
import { DAY, TrialPlay } from './play-trial';

/** An invented second trial, still in draft: its design is written and not yet submitted. */
export async function playBrook07(people: DemoPeople, sites: DemoSites, now: number): Promise<void> {
  const start = now - 9 * DAY;
  await createTrial(
    { personId: people.administrator.personId, submissionKey: newId(), clock: () => start },
    {
      code: 'BROOK-07',
      title: 'Intravenous TR-440 in relapsed lymphoma',
      statisticianId: people.statistician.personId,
    },
  );
  const trial = new TrialPlay('BROOK-07', start);
  await trial.run(people.administrator, 'add-site', { siteId: sites.aldermoor });
  await trial.run(people.administrator, 'grant-membership', {
    personId: people.aldermoor.personId,
    role: 'coordinator',
    siteIds: [sites.aldermoor],
  });
  for (const role of ['firstReviewer', 'secondReviewer'] as const) {
    await trial.run(people.administrator, 'grant-membership', {
      personId: people[role].personId,
      role: 'reviewer',
    });
  }
  trial.pass(4 * DAY);
  await trial.run(people.statistician, 'save-design', {
    design: {
      ...designDefaults('levels'),
      doses: { kind: 'levels', levels: ['0.5', '1', '2', '3', '4.5'] },
      unit: 'mg/kg',
      startingDose: '0.5',
      target: 0.2,
      maximumCohorts: 8,
      stopping: { maximumSubjects: 24, repeated: null, precision: null },
    },
  });
}
