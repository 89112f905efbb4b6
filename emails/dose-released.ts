import { doseText } from '@/lib/design/dose-text';
import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, caution, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To the sites: a dose is released for the cohort that is now open. */
export function doseReleased(payload: MailPayloadOf<'dose-released'>): Message {
  const { trialCode, cohortNumber, cohortSize, designVersion, signers, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode}: dose released for cohort ${cohortNumber}`,
    preheader: `Cohort ${cohortNumber} is open. Read the dose on its page before you dose a subject.`,
    title: `Dose released for cohort ${cohortNumber} of ${trialCode}`,
    tone: 'plain',
    blocks: [
      { type: 'dose', label: 'Released dose', dose: doseText(payload, payload.dose) },
      caution,
      paragraph(
        'This message is a notice. Before you dose a subject, read the dose on the cohort’s page: the trial may have been halted since this was sent.',
      ),
      facts({
        Trial: trialCode,
        Cohort: String(cohortNumber),
        Places: cohortSize === 1 ? '1 subject' : `${cohortSize} subjects`,
        Design: `version ${designVersion}`,
        'Signed by': signers.join(', '),
        Released: utcTime(occurredAt),
      }),
      action(`Open cohort ${cohortNumber}`, `/trials/${trialCode}/cohorts/${cohortNumber}`),
    ],
    because: `you record for a site of ${trialCode}`,
    chainHead,
  };
}
