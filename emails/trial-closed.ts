import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To everyone in the trial: it takes no more subjects. */
export function trialClosed(payload: MailPayloadOf<'trial-closed'>): Message {
  const { trialCode, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode} is closed to enrolment`,
    preheader: 'No further subject is dosed. Outcomes and corrections are still recorded.',
    title: `${trialCode} is closed to enrolment`,
    tone: 'plain',
    blocks: [
      paragraph(
        'The safety reviewers have signed it. No further dose is released and no further subject is dosed.',
        'Subjects dosed already finish their window, and their outcomes and corrections are still recorded.',
      ),
      facts({ Trial: trialCode, Closed: utcTime(occurredAt) }),
      action('Open the trial', `/trials/${trialCode}`),
    ],
    because: `you have a role in ${trialCode}`,
    chainHead,
  };
}
