import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { type Deciding, refuse } from '../decision';
import type { Subject } from '../state';
import { completeCohort, completeCohortIfDue, recomputeForCohort } from './completion';
import { ownSubject } from './slots';
import { requirePermission } from '../permitted';
import { awaitingRecommendation, isComplete, placesOf } from '../trial-facts';

interface OutcomeInput {
  readonly outcome: 'present' | 'absent';
  readonly onsetAt: string | null;
}

/** The outcome as it may be stored for a dosed subject: "absent" only after the window, "present" with onset in it. */
function checkedOutcome(deciding: Deciding, subject: Subject, input: OutcomeInput): OutcomeInput {
  const { now } = deciding.context;
  const { dosedAt, windowEndsAt } = subject;
  if (dosedAt === null || windowEndsAt === null) {
    refuse('refused', `Not recorded. The dosing of ${subject.code} is not recorded yet; record it first.`);
  }
  const version =
    deciding.state.designVersions[deciding.state.cohorts[subject.cohortId]?.designVersionId ?? ''];
  const labels = version?.design.response;
  if (input.outcome === 'absent') {
    if (now < windowEndsAt) {
      refuse(
        'refused',
        `Not recorded. The observation window ends at ${windowEndsAt.slice(0, 16).replace('T', ' ')} UTC; “${labels?.absent}” can be recorded from then on.`,
        { outcome: 'The observation window has not ended.' },
      );
    }
    return { outcome: 'absent', onsetAt: null };
  }
  const { onsetAt } = input;
  if (onsetAt === null)
    refuse('invalid', 'Not recorded. Enter when it began.', { onsetAt: 'Enter when it began.' });
  if (onsetAt > now) {
    refuse('refused', 'Not recorded. The onset lies in the future.', { onsetAt: 'This is in the future.' });
  }
  if (onsetAt < dosedAt) {
    refuse('refused', 'Not recorded. The onset lies before the dosing.', { onsetAt: 'Before the dosing.' });
  }
  if (onsetAt > windowEndsAt) {
    refuse(
      'refused',
      `Not recorded. It began after the observation window; it is then an event, not an outcome, and the outcome is “${labels?.absent}”.`,
      { onsetAt: 'After the end of the observation window.' },
    );
  }
  return { outcome: 'present', onsetAt };
}

/** Records the outcome of a dosed subject; the last one of the cohort completes it and computes what follows. */
export function recordOutcome(deciding: Deciding, input: TrialInput<'record-outcome'>): void {
  const { subject } = ownSubject(deciding, input.subjectId);
  if (subject.state === 'complete') {
    refuse('conflict', `Not recorded. ${subject.code} already has an outcome; a change is a correction.`);
  }
  const checked = checkedOutcome(deciding, subject, input);
  deciding.emit({ kind: 'outcome-recorded', subjectId: subject.id, ...checked, grade: null });
  completeCohortIfDue(deciding);
}

/**
 * Corrects a recorded outcome with a reason, old and new both kept. Before the release that followed from it a new
 * revision of the recommendation supersedes the old one, whose signatures then do not count.
 */
export function correctOutcome(deciding: Deciding, input: TrialInput<'correct-outcome'>): void {
  const { subject } = ownSubject(deciding, input.subjectId);
  if (subject.state !== 'complete') {
    refuse('refused', `Not corrected. ${subject.code} has no outcome yet; record it first.`);
  }
  if (subject.revision !== input.seenRevision) {
    refuse(
      'conflict',
      'Not corrected. The record changed since this page was opened; load it again and compare.',
    );
  }
  const cohort = deciding.state.cohorts[subject.cohortId];
  if (!cohort || (cohort.state !== 'open' && cohort.state !== 'under-review')) {
    refuse(
      'refused',
      'Not corrected. The dose that followed from this cohort is already released; corrections after a release are not yet offered here. Tell the safety reviewers.',
    );
  }
  const checked = checkedOutcome(deciding, subject, input);
  const before = { outcome: subject.outcome, onsetAt: subject.onsetAt, grade: subject.grade };
  const after = { ...checked, grade: subject.grade };
  if (before.outcome === after.outcome && before.onsetAt === after.onsetAt) {
    refuse('refused', 'Not corrected. The record already says this.');
  }
  deciding.emit({ kind: 'outcome-corrected', subjectId: subject.id, before, after, reason: input.reason });
  const awaiting = awaitingRecommendation(deciding.state);
  if (cohort.state === 'under-review' && awaiting !== null) {
    deciding.emit({ kind: 'recommendation-superseded', recommendationId: awaiting.id });
    recomputeForCohort(deciding, cohort.id);
  }
}

/** Resubmits a returned cohort after answers and corrections: a new revision, signatures from zero. */
export function resubmitCohort(deciding: Deciding, input: TrialInput<'resubmit-cohort'>): void {
  const member = requirePermission(deciding, 'subject.record');
  const { state } = deciding;
  const cohort = state.cohorts[input.cohortId];
  const isOwn =
    cohort !== undefined &&
    placesOf(state, cohort.id).some((subject) => member.siteIds.includes(subject.siteId));
  if (!cohort || !isOwn) refuse('not-found', 'This cohort does not exist, or you have no access to it.');
  if (cohort.state !== 'open' || !cohort.isRecordsOnly) {
    refuse(
      'conflict',
      `Not resubmitted. Cohort ${cohort.number} was not returned, or was resubmitted already.`,
    );
  }
  if (state.trial.state === 'halted') {
    refuse('refused', 'Not resubmitted. The trial is halted; resubmit when it is lifted.');
  }
  if (!isComplete(state, cohort)) {
    refuse('refused', `Not resubmitted. Cohort ${cohort.number} still lacks an outcome.`);
  }
  completeCohort(deciding, cohort.id);
}
