import { doseText } from '@/lib/design/dose-text';
import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, caution, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To the sponsor: a dose is signed and the next cohort is open. */
export function doseReleasedSummary(payload: MailPayloadOf<'dose-released-summary'>): Message {
  const { trialCode, cohortNumber, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode}: cohort ${cohortNumber} is open`,
    preheader: 'The reviewers have signed its dose.',
    title: `Cohort ${cohortNumber} of ${trialCode} is open`,
    tone: 'plain',
    blocks: [
      { type: 'dose', label: 'Signed dose', dose: doseText(payload, payload.dose) },
      caution,
      paragraph(
        'The safety reviewers have signed this dose, and the sites may reserve places.',
        'The course of signed doses and the enrolment stand on the summary page.',
      ),
      facts({ Trial: trialCode, Cohort: String(cohortNumber), Released: utcTime(occurredAt) }),
      action('Open the summary', `/trials/${trialCode}/summary`),
    ],
    because: `you are the sponsor’s reader of ${trialCode}`,
    chainHead,
  };
}
