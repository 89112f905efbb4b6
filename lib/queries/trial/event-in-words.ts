import type { TrialEventPayload } from '@/lib/conduct/events';
import { doseText } from '@/lib/design/dose-text';
import { ROLE_NAMES } from '@/lib/policy/roles';
import type { Design } from '@/lib/schemas/design';

/** The names behind the ids of a trial's events. */
export interface EventNames {
  readonly person: (id: string) => string;
  readonly site: (id: string) => string;
  readonly subject: (id: string) => string;
  readonly cohort: (id: string) => number | null;
  readonly recommendation: (id: string) => number | null;
  readonly design: Design | null;
}

/** What an event says, in one line. */
export function eventInWords(event: TrialEventPayload, names: EventNames): string {
  const dose = (text: string) => (names.design ? doseText(names.design, text) : text);
  const label = (outcome: string | null) => {
    if (names.design && outcome === 'present') return `“${names.design.response.present}”`;
    if (names.design && outcome === 'absent') return `“${names.design.response.absent}”`;
    return outcome ?? 'none';
  };
  switch (event.kind) {
    case 'trial-created':
      return `Trial ${event.code} created, quorum ${event.quorum}.`;
    case 'site-added':
      return `${names.site(event.siteId)} added, ${event.state}.`;
    case 'member-granted':
      return `${names.person(event.personId)} became ${ROLE_NAMES[event.role].toLowerCase()}${event.siteIds.length > 0 ? ` at ${event.siteIds.map(names.site).join(', ')}` : ''}.`;
    case 'member-ended':
      return `The role of ${names.person(event.personId)} ended.`;
    case 'design-saved':
      return `Design version ${event.number} saved.`;
    case 'design-submitted':
      return 'Design submitted for approval.';
    case 'design-returned':
      return `Design returned to draft: ${event.reason}`;
    case 'design-approved':
      return 'Design approved.';
    case 'recommendation-computed':
      return `Recommendation for cohort ${event.number}, revision ${event.revision}, computed: ${event.outcome === 'dose' && event.dose !== null ? dose(event.dose) : 'stop'}.`;
    case 'signed':
      return `Signed: “${event.meaning}”${event.reason ? ` Reason: ${event.reason}` : ''}`;
    case 'dose-released':
      return `${dose(event.dose)} released for cohort ${event.cohortNumber}${event.dose === event.recommendedDose ? '' : ` (recommended: ${dose(event.recommendedDose)})`}.`;
    case 'trial-opened':
      return 'Trial opened.';
    case 'cohort-opened':
      return `Cohort ${event.number} opened at ${dose(event.dose)}, ${event.size} places.`;
    case 'slot-reserved':
      return `Place ${event.place} of cohort ${names.cohort(event.cohortId) ?? '?'} reserved for ${event.code} at ${names.site(event.siteId)}.`;
    case 'slot-released':
      return `Place of ${names.subject(event.subjectId)} given back: ${event.reason}`;
    case 'dosing-recorded':
      return `${names.subject(event.subjectId)} dosed with ${dose(event.doseGiven)}${event.deviationReason ? `; deviation: ${event.deviationReason}` : ''}.`;
    case 'outcome-recorded':
      return `Outcome of ${names.subject(event.subjectId)}: ${label(event.outcome)}.`;
    case 'outcome-corrected':
      return `Outcome of ${names.subject(event.subjectId)} corrected from ${label(event.before.outcome)} to ${label(event.after.outcome)}: ${event.reason}`;
    case 'cohort-completed':
      return `Cohort ${names.cohort(event.cohortId) ?? '?'} complete.`;
    case 'cohort-closed-short':
      return `Cohort ${names.cohort(event.cohortId) ?? '?'} closed short; ${event.cancelledSubjectIds.length} undosed places cancelled.`;
    case 'recommendation-returned':
      return `Packet for cohort ${names.recommendation(event.recommendationId) ?? '?'} returned.`;
    case 'recommendation-superseded':
      return `Recommendation for cohort ${names.recommendation(event.recommendationId) ?? '?'} superseded by a correction.`;
    case 'recommendation-overtaken':
      return `Recommendation for cohort ${names.recommendation(event.recommendationId) ?? '?'} overtaken by a halt.`;
    case 'trial-halted':
      return `Trial halted: ${event.reason}`;
    case 'trial-lifted':
      return `Halt lifted; ${event.plan === 'continue' ? 'the open cohort continues' : 'the open cohort is closed short'}.`;
    case 'trial-closed':
      return 'Trial closed to enrolment.';
  }
}
