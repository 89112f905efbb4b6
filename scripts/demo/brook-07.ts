import { designDefaults } from '@/lib/schemas/design-defaults';
import type { DemoPeople, DemoSites } from './people';
import { DAY } from './play-trial';
import { startTrial } from './start-trial';

/** An invented second trial, still in draft: its design is written and not yet submitted. */
export async function playBrook07(people: DemoPeople, sites: DemoSites, now: number): Promise<void> {
  const trial = await startTrial(people, sites, {
    code: 'BROOK-07',
    title: 'Intravenous TR-440 in relapsed lymphoma',
    start: now - 9 * DAY,
    sites: ['aldermoor'],
    reviewers: ['firstReviewer', 'secondReviewer'],
  });
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
