import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { type Deciding, refuse } from '../decision';
import { requirePermission } from '../permitted';
import type { Cohort, Member, Subject, TrialState } from '../state';
import { lowestFreePlace } from '../trial-facts';

/** Refuses acts on a site that is not the member's, as if it did not exist. */
export function requireOwnSite(member: Member, siteId: string): void {
  if (!member.siteIds.includes(siteId)) {
    refuse('not-found', 'This record does not exist, or you have no access to it.');
  }
}

/** The subject of the member's own site; any other looks as if it did not exist. */
export function ownSubject(deciding: Deciding, subjectId: string): { subject: Subject; member: Member } {
  const member = requirePermission(deciding, 'subject.record');
  const subject = deciding.state.subjects[subjectId];
  if (!subject) refuse('not-found', 'This record does not exist, or you have no access to it.');
  requireOwnSite(member, subject.siteId);
  return { subject, member };
}

/** Why no new subject may be reserved or dosed in a cohort now, as a sentence; null when one may. */
export function whyNoNewSubject(state: TrialState, cohort: Cohort, siteId: string): string | null {
  if (state.trial.state === 'halted')
    return 'The trial is halted: nobody is reserved or dosed until it is lifted.';
  if (state.trial.state !== 'open') return 'The trial is not open to enrolment.';
  if (cohort.state !== 'open') return `Cohort ${cohort.number} is not open.`;
  if (cohort.isRecordsOnly) return `Cohort ${cohort.number} is open for answers and corrections only.`;
  const site = state.sites[siteId];
  if (site?.state !== 'active') return 'The site is not active in this trial.';
  return null;
}

/** Reserves the lowest free place of the open cohort for a subject of the member's site. */
export function reserveSlot(deciding: Deciding, input: TrialInput<'reserve-slot'>): void {
  const member = requirePermission(deciding, 'subject.record');
  requireOwnSite(member, input.siteId);
  const { state, context } = deciding;
  const cohort = state.cohorts[input.cohortId];
  if (!cohort) refuse('not-found', 'This cohort does not exist, or you have no access to it.');
  const obstacle = whyNoNewSubject(state, cohort, input.siteId);
  if (obstacle !== null) refuse('refused', `Not reserved. ${obstacle}`);
  const place = lowestFreePlace(state, cohort);
  if (place === null) {
    refuse('conflict', `Not reserved. All ${cohort.size} places of cohort ${cohort.number} are taken.`);
  }
  const isTaken = Object.values(state.subjects).some(
    (subject) => subject.code === input.code && subject.place !== null,
  );
  if (isTaken) {
    refuse('refused', 'Not reserved. This subject code is already used in the trial.', {
      code: 'Already used in this trial.',
    });
  }
  deciding.emit({
    kind: 'slot-reserved',
    subjectId: context.newId(),
    cohortId: cohort.id,
    cohortSize: cohort.size,
    place,
    siteId: input.siteId,
    code: input.code,
  });
}

/** Gives a reserved place back, with a reason; a dosed subject keeps theirs. */
export function releaseSlot(deciding: Deciding, input: TrialInput<'release-slot'>): void {
  const { subject } = ownSubject(deciding, input.subjectId);
  if (subject.state !== 'reserved') {
    refuse(
      'refused',
      subject.place === null
        ? `Not released. The place of ${subject.code} was given back already.`
        : `Not released. ${subject.code} has been dosed and stays in the cohort.`,
    );
  }
  deciding.emit({ kind: 'slot-released', subjectId: subject.id, reason: input.reason });
}
