import { designDefaults } from '@/lib/schemas/design-defaults';
import type { DemoPeople, DemoSites } from './people';
import { DAY, HOUR, type PlayedSubject } from './play-trial';
import { startTrial } from './start-trial';

/**
 * An invented controlled human infection study: the inoculum, in colony-forming units, at which six of ten volunteers are
 * infected; levels a power of ten apart, cohorts of four, virtual observations. The third cohort is in its window.
 */
export async function playFord11(people: DemoPeople, sites: DemoSites, now: number): Promise<void> {
  const trial = await startTrial(people, sites, {
    code: 'FORD-11',
    title: 'Inoculum of strain QX5 in healthy volunteers',
    start: now - 52 * DAY,
    sites: ['valk'],
    reviewers: ['firstReviewer', 'thirdReviewer'],
    hasSponsor: true,
  });
  trial.pass(4 * DAY);
  await trial.design(people.statistician, people.firstReviewer, {
    ...designDefaults('levels'),
    response: { present: 'infected', absent: 'not infected', kind: 'wanted', direction: 'rising' },
    target: 0.6,
    doses: { kind: 'levels', levels: ['1000', '10000', '100000', '1000000', '10000000'] },
    unit: '[CFU]',
    doseNotation: 'powers-of-ten',
    scale: 'log',
    startingDose: '10000',
    cohortSize: 4,
    evaluableForRise: 4,
    maximumCohorts: 8,
    rule: { name: 'virtual-observations', slope: 0.15, carryBounds: null },
    guardrails: {
      largestRise: { kind: 'fold', factor: 10 },
      projection: null,
      ties: 'lower',
      tiesReason: null,
      noSkipping: 'tried',
      coherence: 'one-way',
      closing: null,
    },
    stopping: { maximumSubjects: 32, repeated: null, precision: null },
    finalEstimator: { name: 'centred-isotonic', intervalLevel: 0.95 },
    observationWindow: { length: 14, unit: 'days' },
  });
  trial.pass(DAY);
  const reviewers = [people.firstReviewer, people.thirdReviewer];
  let serial = 0;
  const volunteer = (outcome: PlayedSubject['outcome']): PlayedSubject => {
    serial += 1;
    return {
      coordinator: people.valk,
      siteId: sites.valk,
      code: `VLK-${String(serial).padStart(3, '0')}`,
      reservedAfter: (10 + serial) * HOUR,
      dosedAfter: 2 * DAY + (serial % 4) * HOUR,
      ...(outcome === undefined ? {} : { outcome }),
    };
  };
  await trial.release(reviewers);
  await trial.cohort(([5 * DAY, 'absent', 'absent', 'absent'] as const).map(volunteer));
  trial.pass(DAY);
  await trial.release(reviewers);
  await trial.cohort(([4 * DAY, 6 * DAY, 'absent', 'absent'] as const).map(volunteer));
  trial.now = now - 8 * DAY;
  await trial.release(reviewers);
  await trial.cohort(([3 * DAY, undefined, undefined, undefined] as const).map(volunteer));
}
