import type { Cohort, TrialState } from '@/lib/conduct/state';
import { cohortsInOrder, placesOf, standingHalt, versionInForce } from '@/lib/conduct/trial-facts';
import { doseText } from '@/lib/design/dose-text';
import { type CohortStanding, cohortStanding, whatFollows } from './cohort-words';
import { type ReaderTrial, readerTrial, type TrialReader } from './reader-trial';

/** A cohort as a line of the list. */
export interface CohortLine {
  readonly number: number;
  /** The exact dose, and as it is read with its unit. */
  readonly dose: string;
  readonly doseText: string;
  readonly standing: CohortStanding;
  readonly placesTaken: number;
  readonly size: number;
  readonly outcomesIn: number;
  readonly openedAt: string;
  readonly completedAt: string | null;
  /** Responses among the evaluable; null for the site roles. */
  readonly responses: { readonly present: number; readonly evaluable: number } | null;
  /** Subjects of the reader's sites; null for the others. */
  readonly ownSubjects: number | null;
}

/** The cohorts of a trial, cut to what their reader may see. */
export interface CohortListView {
  readonly trialCode: string;
  readonly presentLabel: string | null;
  readonly cohorts: readonly CohortLine[];
  /** What the trial waits for now. */
  readonly follows: string;
}

function lineOf(trial: ReaderTrial, cohort: Cohort): CohortLine {
  const { state } = trial.loaded;
  const version = state.designVersions[cohort.designVersionId];
  if (!version) throw new Error(`Cohort ${cohort.id} has no design version.`);
  const places = placesOf(state, cohort.id);
  const present = places.filter((subject) => subject.outcome === 'present').length;
  const absent = places.filter((subject) => subject.outcome === 'absent').length;
  const ownSubjects = places.filter((subject) => trial.siteIds.includes(subject.siteId)).length;
  return {
    number: cohort.number,
    dose: cohort.dose,
    doseText: doseText(version.design, cohort.dose),
    standing: cohortStanding(cohort),
    placesTaken: places.length,
    size: cohort.size,
    outcomesIn: places.filter((subject) => subject.outcome !== null).length,
    openedAt: cohort.openedAt,
    completedAt: cohort.completedAt,
    responses: trial.may('subject.read-all') ? { present, evaluable: present + absent } : null,
    ownSubjects: trial.may('subject.read-own-site') ? ownSubjects : null,
  };
}

function beforeTheFirst(state: TrialState): string {
  if (state.trial.state === 'draft') {
    return 'The design is being written. The first cohort opens when its starting dose is signed.';
  }
  return versionInForce(state) === null
    ? 'The design is in review. The first cohort opens when its starting dose is signed.'
    : 'The starting dose is under review. The first cohort opens when it is signed.';
}

/** The cohorts of a trial for a reader, or null when the trial or its cohorts are not theirs. */
export async function cohortList(reader: TrialReader, code: string): Promise<CohortListView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('cohort.read')) return null;
  const { state } = trial.loaded;
  const cohorts = cohortsInOrder(state);
  const last = cohorts.at(-1);
  return {
    trialCode: state.trial.code,
    presentLabel: trial.may('subject.read-all')
      ? (versionInForce(state)?.design.response.present ?? null)
      : null,
    cohorts: cohorts.map((cohort) => lineOf(trial, cohort)),
    follows:
      last === undefined
        ? beforeTheFirst(state)
        : standingHalt(state) && last.state === 'open'
          ? `The trial is halted. Outcomes and corrections of cohort ${last.number} go on.`
          : last.state === 'open' && !last.isRecordsOnly
            ? `Cohort ${last.number} is open. ${whatFollows(state, last)}`
            : whatFollows(state, last),
  };
}
