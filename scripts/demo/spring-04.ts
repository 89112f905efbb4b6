import { designDefaults } from '@/lib/schemas/design-defaults';
import type { DemoPeople, DemoSites } from './people';
import { DAY, HOUR, type PlayedSubject } from './play-trial';
import { startTrial } from './start-trial';

/**
 * An invented ED90 study: the volume of a local anaesthetic at which nine of ten blocks succeed, in steps of 0.5 mL,
 * cohorts of two, Joseph's gains. Seven cohorts are complete; the packet of the seventh waits with one signature.
 */
export async function playSpring04(people: DemoPeople, sites: DemoSites, now: number): Promise<void> {
  const cohorts: readonly (readonly [boolean, boolean])[] = [
    [true, false],
    [true, true],
    [true, true],
    [false, true],
    [true, true],
    [true, true],
    [true, true],
  ];
  const atSites = [
    { role: 'aldermoor', code: 'ALD' },
    { role: 'serafin', code: 'SRF' },
  ] as const;
  const trial = await startTrial(people, sites, {
    code: 'SPRING-04',
    title: 'Volume of AN-207 for a block at the ankle',
    start: now - 17 * DAY,
    sites: ['aldermoor', 'serafin'],
    reviewers: ['firstReviewer', 'secondReviewer', 'thirdReviewer'],
  });
  trial.pass(2 * DAY);
  await trial.design(people.statistician, people.thirdReviewer, {
    ...designDefaults('range'),
    response: { present: 'successful block', absent: 'block failed', kind: 'wanted', direction: 'rising' },
    target: 0.9,
    doses: { kind: 'range', lowest: '8', highest: '30', increment: '0.5' },
    unit: 'mL',
    scale: 'linear',
    startingDose: '16',
    cohortSize: 2,
    evaluableForRise: 2,
    maximumCohorts: 20,
    rule: { name: 'joseph', slope: 0.25, priorSd: 4 },
    guardrails: {
      largestRise: { kind: 'step', step: 4 },
      projection: null,
      ties: 'lower',
      tiesReason: null,
      noSkipping: 'off',
      coherence: 'off',
      closing: null,
    },
    stopping: { maximumSubjects: 40, repeated: null, precision: null },
    finalEstimator: { name: 'centred-isotonic', intervalLevel: 0.95 },
    observationWindow: { length: 1, unit: 'hours' },
  });
  trial.pass(DAY);
  const reviewers = [people.secondReviewer, people.thirdReviewer];
  let serial = 0;
  for (const outcomes of cohorts) {
    await trial.release(reviewers);
    const subjects = outcomes.map((isSuccess, index): PlayedSubject => {
      serial += 1;
      const { role, code } = atSites[index === 0 ? 0 : 1];
      return {
        coordinator: people[role],
        siteId: sites[role],
        code: `${code}-${String(serial).padStart(3, '0')}`,
        reservedAfter: (4 + index) * HOUR,
        dosedAfter: (20 + index) * HOUR,
        outcome: isSuccess ? HOUR / 2 : 'absent',
      };
    });
    await trial.cohort(subjects);
    trial.pass(6 * HOUR);
  }
  await trial.release(reviewers.slice(0, 1));
}
