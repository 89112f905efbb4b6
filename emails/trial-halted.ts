import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { action, facts, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To everyone in the trial: it is halted. Sent before every other mail. */
export function trialHalted(payload: MailPayloadOf<'trial-halted'>): Message {
  const { trialCode, occurredAt, chainHead } = payload;
  return {
    subject: `${trialCode} is halted: dose nobody`,
    preheader: 'No place is reserved, no subject is dosed and no dose is released until the halt is lifted.',
    title: `${trialCode} is halted`,
    tone: 'halt',
    blocks: [
      paragraph(
        'Dose nobody. While the trial is halted no place is reserved, no subject is dosed and no dose is released.',
        'Outcomes, corrections and answers are still recorded.',
      ),
      paragraph(
        'The halt stands until the quorum of safety reviewers lifts it. Its reason stands on the trial’s page.',
        'In an emergency use the site’s own emergency procedure, not this message.',
      ),
      facts({ Trial: trialCode, Halted: utcTime(occurredAt) }),
      action('Open the trial', `/trials/${trialCode}`),
    ],
    because: `you have a role in ${trialCode}`,
    chainHead,
  };
}
