import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To the safety reviewers: a design waits for approval. */
export function designSubmitted(payload: MailPayloadOf<'design-submitted'>): Message {
  const { trialCode, designVersion, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode}: a design waits for approval`,
    preheader: `Version ${designVersion} was submitted and waits for a safety reviewer.`,
    title: `The design of ${trialCode} waits for approval`,
    tone: 'plain',
    blocks: [
      paragraph(
        `The statistician has submitted version ${designVersion} of the design.`,
        'One safety reviewer who did not propose it approves it by signature or returns it with a reason.',
        'After the approval the starting dose waits for signatures like every other dose.',
      ),
      facts({ Trial: trialCode, Design: `version ${designVersion}`, Submitted: utcTime(occurredAt) }),
      action('Read the design', `/trials/${trialCode}/design`),
    ],
    because: `you are a safety reviewer of ${trialCode}`,
    chainHead,
  };
}
