import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To everyone in the trial: the quorum has lifted the halt. */
export function trialLifted(payload: MailPayloadOf<'trial-lifted'>): Message {
  const { trialCode, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode}: the halt is lifted`,
    preheader: 'Read on the trial’s page what was signed for its open cohort before anybody is dosed.',
    title: `The halt of ${trialCode} is lifted`,
    tone: 'plain',
    blocks: [
      paragraph(
        'The quorum of safety reviewers has lifted the halt and signed what becomes of the open cohort: it goes on at its dose, or takes no new subject.',
        'Read on the trial’s page which of the two holds before anybody is dosed.',
      ),
      facts({ Trial: trialCode, Lifted: utcTime(occurredAt) }),
      action('Open the trial', `/trials/${trialCode}`),
    ],
    because: `you have a role in ${trialCode}`,
    chainHead,
  };
}
