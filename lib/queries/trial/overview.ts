import { cohortsInOrder, currentCohort, placesOf, versionInForce } from '@/lib/conduct/trial-facts';
import type { Design } from '@/lib/schemas/design';
import { type ProportionAtDose, proportionsByDose } from './proportions-by-dose';
import { readerTrial, type TrialReader } from './reader-trial';

/** What the overview shows: where the trial stands, and the proportions for those who read all subjects. */
export interface OverviewView {
  readonly code: string;
  readonly state: string;
  readonly design: Design | null;
  readonly designVersion: number | null;
  readonly cohort: {
    readonly number: number;
    readonly dose: string;
    readonly state: string;
    readonly isRecordsOnly: boolean;
    readonly size: number;
    readonly taken: number;
    readonly outcomes: number;
  } | null;
  readonly signedCohorts: number;
  /** For readers of all subjects; null for the others. */
  readonly proportions: readonly ProportionAtDose[] | null;
  readonly roleActs: 'records' | 'signs' | 'designs' | 'reads';
}

/** The overview of a trial for a reader; null when it is not theirs (sponsors have the summary). */
export async function overviewPage(reader: TrialReader, code: string): Promise<OverviewView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('cohort.read')) return null;
  const { state } = trial.loaded;
  const version = versionInForce(state);
  const cohort = currentCohort(state);
  const places = cohort ? placesOf(state, cohort.id) : [];
  const complete = cohortsInOrder(state).filter(
    (each) => each.state === 'signed' || each.state === 'under-review',
  );
  return {
    code: state.trial.code,
    state: state.trial.state,
    design: version?.design ?? null,
    designVersion: version?.number ?? null,
    cohort: cohort && {
      number: cohort.number,
      dose: cohort.dose,
      state: cohort.state,
      isRecordsOnly: cohort.isRecordsOnly,
      size: cohort.size,
      taken: places.length,
      outcomes: places.filter((subject) => subject.outcome !== null).length,
    },
    signedCohorts: cohortsInOrder(state).filter((each) => each.state === 'signed').length,
    proportions: trial.may('subject.read-all') ? proportionsByDose(state, complete) : null,
    roleActs: trial.may('subject.record')
      ? 'records'
      : trial.may('recommendation.sign')
        ? 'signs'
        : trial.may('design.write')
          ? 'designs'
          : 'reads',
  };
}
