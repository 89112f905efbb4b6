import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, caution, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To the safety reviewers: a packet waits for signatures. The proposed dose stands on the page alone. */
export function recommendationReady(payload: MailPayloadOf<'recommendation-ready'>): Message {
  const { trialCode, afterCohort, occurredAt, chainHead } = payload;
  const packet = afterCohort === null ? 'the starting dose' : `cohort ${afterCohort}`;
  return {
    subject: `${trialCode}: ${packet} waits for review`,
    preheader: 'The recommendation is computed and waits for signatures.',
    title: `${packet[0]?.toUpperCase()}${packet.slice(1)} of ${trialCode} waits for review`,
    tone: 'plain',
    blocks: [
      paragraph(
        afterCohort === null
          ? 'The design is approved, and the starting dose waits for signatures.'
          : `Every outcome of cohort ${afterCohort} is recorded, and the recommendation is computed from them.`,
        'The review page holds what is needed to judge it. The recommendation is not in this message.',
      ),
      paragraph(
        'A release needs the signatures of the quorum on the same dose. One reviewer may return the packet or halt the trial.',
      ),
      facts({ Trial: trialCode, Packet: packet, Computed: utcTime(occurredAt) }),
      action('Open the review', `/trials/${trialCode}/review`),
      caution,
    ],
    because: `you are a safety reviewer of ${trialCode}`,
    chainHead,
  };
}
