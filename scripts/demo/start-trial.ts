import { createTrial } from '@/lib/commands/installation/create-trial';
import { newId } from '@/lib/hash';
import type { DemoPeople, DemoSites } from './people';
import { TrialPlay } from './play-trial';

/** A demo trial and who takes part; every site has the coordinator of its name. */
export interface DemoTrial {
  readonly code: string;
  readonly title: string;
  /** When the administrator creates it, in milliseconds since 1970. */
  readonly start: number;
  readonly sites: readonly (keyof DemoSites)[];
  readonly reviewers: readonly ('firstReviewer' | 'secondReviewer' | 'thirdReviewer')[];
  readonly hasSponsor?: boolean;
}

/** Has the administrator create a demo trial with its first statistician, its sites and its team. */
export async function startTrial(people: DemoPeople, sites: DemoSites, demo: DemoTrial): Promise<TrialPlay> {
  const { code, title, start } = demo;
  const { administrator, statistician, sponsor } = people;
  await createTrial(
    { personId: administrator.personId, submissionKey: newId(), clock: () => start },
    { code, title, statisticianId: statistician.personId },
  );
  const trial = new TrialPlay(code, start);
  for (const site of demo.sites) {
    const siteId = sites[site];
    await trial.run(administrator, 'add-site', { siteId });
    await trial.run(administrator, 'grant-membership', {
      personId: people[site].personId,
      role: 'coordinator',
      siteIds: [siteId],
    });
  }
  for (const reviewer of demo.reviewers) {
    await trial.run(administrator, 'grant-membership', {
      personId: people[reviewer].personId,
      role: 'reviewer',
    });
  }
  if (demo.hasSponsor) {
    await trial.run(administrator, 'grant-membership', { personId: sponsor.personId, role: 'sponsor' });
  }
  return trial;
}
