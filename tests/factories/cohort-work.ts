import { vi } from 'vitest';
import type { CohortActions, CohortWork, OwnSubjectData } from '@/components/cohorts/cohort-data';

/** A cohort at 60 mg, its page read at noon in Vienna, for the tests of its forms. */
export const work: CohortWork = {
  trialCode: 'WELL-99',
  cohortNumber: 4,
  dose: { value: '60', unit: 'mg', text: '60 mg', releasedAt: '2027-03-01T09:22:41.000Z' },
  labels: { present: 'dose-limiting toxicity', absent: 'none' },
  readAt: '2027-03-14T11:00:30.000Z',
};

const id = '0190a000-0000-7000-8000-000000000001';

/** A subject of one's own site, reserved and not dosed yet. */
export function reservedSubject(change: Partial<OwnSubjectData> = {}): OwnSubjectData {
  return {
    id,
    code: 'ALD-014',
    site: { name: 'Aldermoor Hospital', timeZone: 'Europe/Vienna' },
    state: 'reserved',
    revision: 1,
    reservedAt: '2027-03-10T08:00:00.000Z',
    dosedAt: null,
    doseGiven: null,
    isDeviation: false,
    deviationReason: null,
    windowEndsAt: null,
    outcome: null,
    onsetAt: null,
    acts: { releaseSlot: { why: null }, recordDosing: { why: null } },
    ...change,
  };
}

/** The same subject dosed, its window running for two more days when the page was read. */
export function dosedSubject(change: Partial<OwnSubjectData> = {}): OwnSubjectData {
  return reservedSubject({
    state: 'dosed',
    revision: 2,
    dosedAt: '2027-03-09T08:00:00.000Z',
    doseGiven: '60',
    windowEndsAt: '2027-03-16T08:00:00.000Z',
    acts: { recordPresent: { why: null }, recordAbsent: { why: 'The observation window has not ended.' } },
    ...change,
  });
}

/** The same subject with an outcome on record, its window over. */
export function completeSubject(change: Partial<OwnSubjectData> = {}): OwnSubjectData {
  return dosedSubject({
    state: 'complete',
    revision: 3,
    dosedAt: '2027-03-02T08:00:00.000Z',
    windowEndsAt: '2027-03-09T08:00:00.000Z',
    outcome: 'absent',
    acts: { correctOutcome: { why: null } },
    ...change,
  });
}

/** Actions that record what they were called with and answer as told. */
export function answering(answer: Awaited<ReturnType<CohortActions['reserveSlot']>>) {
  const act = () => vi.fn().mockResolvedValue(answer);
  return {
    reserveSlot: act(),
    releaseSlot: act(),
    recordDosing: act(),
    recordOutcome: act(),
    correctOutcome: act(),
    resubmitCohort: act(),
  } satisfies Record<keyof CohortActions, ReturnType<typeof vi.fn>>;
}

export const recorded = { ok: true as const, value: { events: [] as string[] } };
