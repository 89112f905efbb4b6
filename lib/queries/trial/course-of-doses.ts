import type { Cohort, Outcome, RecommendationRow } from '@/lib/conduct/state';
import {
  awaitingRecommendation,
  cohortsInOrder,
  draftVersion,
  placesOf,
  submittedVersion,
  versionInForce,
} from '@/lib/conduct/trial-facts';
import type { Design } from '@/lib/schemas/design';
import type { ReaderTrial } from './reader-trial';

/** The course of doses, already cut to what its reader may see: marks and the proposed dose for reviewers only. */
export interface CourseView {
  readonly doses: Design['doses'];
  readonly scale: Design['scale'];
  readonly unit: string;
  readonly doseNotation: Design['doseNotation'];
  readonly labels: { readonly present: string; readonly absent: string };
  readonly cohorts: readonly {
    readonly number: number;
    readonly dose: string;
    readonly state: Cohort['state'];
    /** One mark a place, by place; absent where the reader may not see subjects. */
    readonly marks?: readonly (Outcome | 'pending')[];
  }[];
  readonly proposed: { readonly number: number; readonly dose: string } | null;
}

function proposedOf(awaiting: RecommendationRow | null): CourseView['proposed'] {
  return awaiting?.dose ? { number: awaiting.number, dose: awaiting.dose } : null;
}

/** The course of a trial's doses for a reader; null before there is a design they may see. */
export function courseOfDoses(trial: ReaderTrial): CourseView | null {
  const { state } = trial.loaded;
  const inForce = versionInForce(state);
  const version =
    inForce ?? (trial.may('design.read') ? (submittedVersion(state) ?? draftVersion(state)) : null);
  if (version === null) return null;
  const { design } = version;
  const seesMarks = trial.may('recommendation.read');
  return {
    doses: design.doses,
    scale: design.scale,
    unit: design.unit,
    doseNotation: design.doseNotation,
    labels: { present: design.response.present, absent: design.response.absent },
    cohorts: cohortsInOrder(state).map((cohort) => ({
      number: cohort.number,
      dose: cohort.dose,
      state: cohort.state,
      ...(seesMarks
        ? { marks: placesOf(state, cohort.id).map((subject) => subject.outcome ?? ('pending' as const)) }
        : {}),
    })),
    proposed: seesMarks ? proposedOf(awaitingRecommendation(state)) : null,
  };
}
