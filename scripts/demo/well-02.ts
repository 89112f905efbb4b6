import { designDefaults } from '@/lib/schemas/design-defaults';
import type { DemoPeople, DemoSites } from './people';
import { DAY, HOUR, type PlayedSubject } from './play-trial';
import { startTrial } from './start-trial';

/**
 * An invented first-in-human oncology trial: six levels in mg, target 0.25 dose-limiting toxicity, cohorts of three,
 * logarithmic scale, three sites. Half way through: cohort 5 of 10 is open and one outcome is due.
 */
export async function playWell02(people: DemoPeople, sites: DemoSites, now: number): Promise<void> {
  const trial = await startTrial(people, sites, {
    code: 'WELL-02',
    title: 'Oral KB-318 in refractory solid tumours',
    start: now - 194 * DAY,
    sites: ['aldermoor', 'valk', 'serafin'],
    reviewers: ['firstReviewer', 'secondReviewer', 'thirdReviewer'],
    hasSponsor: true,
  });
  trial.pass(6 * DAY);
  await trial.design(people.statistician, people.firstReviewer, {
    ...designDefaults('levels'),
    rule: { name: 'robbins-monro', c: 6, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
  });
  trial.pass(2 * DAY);
  const reviewers = [people.firstReviewer, people.secondReviewer];
  await trial.release(reviewers);

  let serial = 0;
  const subject = (
    role: 'aldermoor' | 'valk' | 'serafin',
    dosedAfter: number,
    outcome: PlayedSubject['outcome'],
    more: Partial<PlayedSubject> = {},
  ): PlayedSubject => {
    serial += 1;
    const codes = { aldermoor: 'ALD', valk: 'VLK', serafin: 'SRF' } as const;
    return {
      coordinator: people[role],
      siteId: sites[role],
      code: `${codes[role]}-${String(serial).padStart(3, '0')}`,
      reservedAfter: dosedAfter - 20 * HOUR,
      dosedAfter,
      ...(outcome === undefined ? {} : { outcome }),
      ...more,
    };
  };
  const release = async () => {
    trial.pass(30 * HOUR);
    await trial.release(reviewers);
  };

  await trial.cohort([
    subject('aldermoor', 2 * DAY, 'absent'),
    subject('valk', 4 * DAY, 'absent'),
    subject('serafin', 7 * DAY, 'absent'),
  ]);
  await release();
  await trial.cohort([
    subject('aldermoor', 3 * DAY, 'absent'),
    subject('aldermoor', 4 * DAY, 'absent'),
    subject('valk', 6 * DAY, 'absent'),
  ]);
  await release();
  await trial.cohort([
    subject('valk', 2 * DAY, 11 * DAY),
    subject('serafin', 5 * DAY, 'absent'),
    subject('aldermoor', 6 * DAY, 'absent'),
  ]);
  await release();
  await trial.cohort([
    subject('serafin', 2 * DAY, 'absent'),
    subject('aldermoor', 3 * DAY, 'absent', {
      doseGiven: '20',
      deviationReason: 'One of the two tablets was dropped and could not be replaced the same day.',
    }),
    subject('valk', 7 * DAY, 'absent'),
  ]);
  // The fifth cohort opens so that the window of its last subject ended five hours ago, whenever the demo is loaded.
  trial.now = now - 35 * DAY - 5 * HOUR - 3 * HOUR;
  await trial.release(reviewers);
  await trial.cohort([
    subject('aldermoor', 2 * DAY, 'absent'),
    subject('serafin', 4 * DAY, 'absent'),
    subject('valk', 7 * DAY, undefined),
  ]);
}
