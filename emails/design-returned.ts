import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To the statistician: a reviewer has sent the design back to draft. */
export function designReturned(payload: MailPayloadOf<'design-returned'>): Message {
  const { trialCode, designVersion, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode}: the design was returned`,
    preheader: `Version ${designVersion} is in draft again, with a reason.`,
    title: `The design of ${trialCode} was returned`,
    tone: 'plain',
    blocks: [
      paragraph(
        `A safety reviewer has returned version ${designVersion} of the design. It is in draft again.`,
        'The reason stands on the design’s page. Change the design there and submit it again.',
      ),
      facts({ Trial: trialCode, Design: `version ${designVersion}`, Returned: utcTime(occurredAt) }),
      action('Open the design', `/trials/${trialCode}/design`),
    ],
    because: `you are a statistician of ${trialCode}`,
    chainHead,
  };
}
