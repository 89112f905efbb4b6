import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To the sites: a reviewer has sent a cohort's packet back with questions. */
export function packetReturned(payload: MailPayloadOf<'packet-returned'>): Message {
  const { trialCode, cohortNumber, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode}: cohort ${cohortNumber} was returned with questions`,
    preheader: 'Its records are open for answers and corrections.',
    title: `Cohort ${cohortNumber} of ${trialCode} was returned with questions`,
    tone: 'plain',
    blocks: [
      paragraph(
        `A safety reviewer has returned the packet of cohort ${cohortNumber}. No dose is released on it.`,
        'The cohort’s records are open for answers and corrections; no place is reserved in it and nobody is dosed.',
        'The questions stand on the cohort’s page.',
      ),
      facts({ Trial: trialCode, Cohort: String(cohortNumber), Returned: utcTime(occurredAt) }),
      action(`Open cohort ${cohortNumber}`, `/trials/${trialCode}/cohorts/${cohortNumber}`),
    ],
    because: `you record for a site of ${trialCode}`,
    chainHead,
  };
}
