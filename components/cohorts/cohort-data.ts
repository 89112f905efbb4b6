import type { ActionResult } from '@/lib/schemas/action-result';
import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import type { TrialCommandType } from '@/lib/schemas/trial-inputs';

/** The two labels of a trial's response, in the protocol's words. */
export interface ResponseLabels {
  readonly present: string;
  readonly absent: string;
}

/** The released dose as the forms need it: exact, with its unit, and as it is read. */
export interface ReleasedDoseData {
  readonly value: string;
  readonly unit: string;
  readonly text: string;
  readonly releasedAt: string;
}

/** An act on a record; `why` says why it is not possible now. */
export interface ActData {
  readonly why: string | null;
}

/** A subject's record as it is shown. */
export interface SubjectData {
  readonly id: string;
  readonly code: string;
  readonly site: { readonly name: string; readonly timeZone: string };
  readonly state: 'reserved' | 'dosed' | 'complete' | 'released' | 'cancelled';
  readonly revision: number;
  readonly reservedAt: string;
  readonly dosedAt: string | null;
  readonly doseGiven: string | null;
  readonly isDeviation: boolean;
  readonly deviationReason: string | null;
  readonly windowEndsAt: string | null;
  readonly outcome: 'present' | 'absent' | 'not-evaluable' | null;
  readonly onsetAt: string | null;
}

/** A record of the reader's own site, with the acts on it. */
export interface OwnSubjectData extends SubjectData {
  readonly acts: {
    readonly releaseSlot?: ActData;
    readonly recordDosing?: ActData;
    readonly recordPresent?: ActData;
    readonly recordAbsent?: ActData;
    readonly correctOutcome?: ActData;
  };
}

/** A place of a cohort as a site sees it. */
export type PlaceData =
  | { readonly place: number; readonly holder: 'own'; readonly subject: OwnSubjectData }
  | { readonly place: number; readonly holder: 'another-site' }
  | { readonly place: number; readonly holder: 'nobody' };

/** What is the same for every form of a cohort's page. */
export interface CohortWork {
  readonly trialCode: string;
  readonly cohortNumber: number;
  readonly dose: ReleasedDoseData;
  readonly labels: ResponseLabels;
  /** The server's time when the page was made. */
  readonly readAt: string;
}

/** What a command of a trial answers with. */
interface CommandAnswer {
  readonly events: readonly string[];
}

/** The server action of one kind of form of a trial. */
export type TrialAction<Type extends TrialCommandType> = (
  input: TrialFormInput<Type>,
) => Promise<ActionResult<CommandAnswer>>;

/** The server actions of a cohort's page. */
export interface CohortActions {
  readonly reserveSlot: TrialAction<'reserve-slot'>;
  readonly releaseSlot: TrialAction<'release-slot'>;
  readonly recordDosing: TrialAction<'record-dosing'>;
  readonly recordOutcome: TrialAction<'record-outcome'>;
  readonly correctOutcome: TrialAction<'correct-outcome'>;
  readonly resubmitCohort: TrialAction<'resubmit-cohort'>;
}

/** What is said after a record that may have been the last one of its cohort. */
export function afterRecord(said: string, events: readonly string[], cohortNumber: number): string {
  return events.includes('cohort-completed')
    ? `${said} Cohort ${cohortNumber} is complete; the recommendation waits for the safety reviewers.`
    : said;
}
