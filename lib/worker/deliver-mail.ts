import { log } from '../log';
import { claimMail, type ClaimedMail, markFailed, markOvertaken, markSent } from './outbox';
import { MailServerUnavailableError, type SendMail } from './send';

export interface RenderedMail {
  readonly subject: string;
  readonly html: string;
  readonly text: string;
}

/** What delivering needs from outside, so that a test can give its own. */
export interface MailDelivery {
  /** Names this worker in its claims; no two workers share one. */
  readonly owner: string;
  readonly send: SendMail;
  readonly render: (mail: ClaimedMail) => Promise<RenderedMail>;
  /** Whether the mail's cause still holds: a dose letter overtaken by a halt is not sent. */
  readonly stillHolds: (mail: ClaimedMail) => Promise<boolean>;
}

/** What became of one try: nothing waited, a mail was dealt with, or the mail server is away. */
export type DeliveryResult = 'idle' | 'done' | 'unavailable';

/**
 * Claims one mail and brings it to its end: sent, overtaken, or put back for later. A worker that dies in between
 * leaves a lease that ends; the next one sends the mail then, under the same Message-ID.
 */
export async function deliverNextMail(delivery: MailDelivery): Promise<DeliveryResult> {
  const mail = await claimMail(delivery.owner);
  if (mail === null) return 'idle';
  const facts = { mail: mail.id, kind: mail.kind, attempt: mail.attempts };
  try {
    if (!(await delivery.stillHolds(mail))) {
      await markOvertaken(mail);
      log().debug(facts, 'mail overtaken, not sent');
      return 'done';
    }
    const { subject, html, text } = await delivery.render(mail);
    await delivery.send({ address: mail.address, subject, html, text, messageId: mail.messageId });
  } catch (error) {
    const isUnavailable = error instanceof MailServerUnavailableError;
    log().warn({ ...facts, error }, isUnavailable ? 'mail server unavailable' : 'mail failed');
    await markFailed(mail, error instanceof Error ? error.message : String(error), !isUnavailable);
    return isUnavailable ? 'unavailable' : 'done';
  }
  if (!(await markSent(mail))) log().warn(facts, 'mail sent after its lease had ended');
  else log().debug(facts, 'mail sent');
  return 'done';
}
