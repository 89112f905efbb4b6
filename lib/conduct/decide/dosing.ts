import { equalDecimals } from '@/lib/design/decimal';
import { doseText } from '@/lib/design/dose-text';
import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { type Deciding, refuse } from '../decision';
import { windowEnd } from '../observation-window';
import { ownSubject, whyNoNewSubject } from './slots';

/**
 * Records that a subject was dosed: when, and the dose really given. A dose other than the released one needs the
 * reason of the deviation; doses on a logarithmic scale are above zero.
 */
export function recordDosing(deciding: Deciding, input: TrialInput<'record-dosing'>): void {
  const { subject } = ownSubject(deciding, input.subjectId);
  const { state, context } = deciding;
  const cohort = state.cohorts[subject.cohortId];
  const version = cohort && state.designVersions[cohort.designVersionId];
  if (!cohort || !version) throw new Error(`Subject ${subject.id} has no cohort.`);
  if (subject.state !== 'reserved') {
    refuse(
      'conflict',
      subject.place === null
        ? `Not recorded. The place of ${subject.code} was given back.`
        : `Not recorded. The dosing of ${subject.code} is already recorded; a change is a correction.`,
    );
  }
  const obstacle = whyNoNewSubject(state, cohort, subject.siteId);
  if (obstacle !== null) refuse('refused', `Not recorded. ${obstacle}`);
  if (input.dosedAt > context.now) {
    refuse('refused', 'Not recorded. The time of dosing lies in the future; enter when it happened.', {
      dosedAt: 'This is in the future.',
    });
  }
  if (input.dosedAt < cohort.openedAt) {
    refuse('refused', 'Not recorded. The dose was released after this time; check the date.', {
      dosedAt: 'The dose was not yet released then.',
    });
  }
  if (version.design.scale === 'log' && equalDecimals(input.doseGiven, '0')) {
    refuse(
      'refused',
      'Not recorded. The trial works on a logarithmic scale, so a dose given is above zero.',
      {
        doseGiven: 'Must be above zero.',
      },
    );
  }
  const isAsReleased = equalDecimals(input.doseGiven, cohort.dose);
  if (!isAsReleased && input.deviationReason === null) {
    refuse(
      'refused',
      `Not recorded. The released dose is ${doseText(version.design, cohort.dose)}; for another dose given, say why.`,
      { deviationReason: 'Say why the dose given differs from the released one.' },
    );
  }
  deciding.emit({
    kind: 'dosing-recorded',
    subjectId: subject.id,
    dosedAt: input.dosedAt,
    doseGiven: input.doseGiven,
    windowEndsAt: windowEnd(input.dosedAt, version.design.observationWindow),
    deviationReason: isAsReleased ? null : input.deviationReason,
  });
}
