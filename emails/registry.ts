import { type MailKind, type MailPayloadOf, parseMailPayload } from '@/lib/schemas/mail-payloads';
import { designReturned } from './design-returned';
import { designSubmitted } from './design-submitted';
import { doseReleased } from './dose-released';
import { doseReleasedSummary } from './dose-released-summary';
import { invitation } from './invitation';
import { asHtml } from './layout/as-html';
import { asText } from './layout/as-text';
import type { MailContext, Message } from './message';
import { packetReturned } from './packet-returned';
import { passwordReset } from './password-reset';
import { recommendationReady } from './recommendation-ready';
import { trialClosed } from './trial-closed';
import { trialHalted } from './trial-halted';
import { trialLifted } from './trial-lifted';

/** The message of every kind of mail in the outbox. A kind without one does not compile. */
const MESSAGES: { readonly [Kind in MailKind]: (payload: MailPayloadOf<Kind>) => Message } = {
  'design-submitted': designSubmitted,
  'design-returned': designReturned,
  'recommendation-ready': recommendationReady,
  'dose-released': doseReleased,
  'dose-released-summary': doseReleasedSummary,
  'packet-returned': packetReturned,
  'trial-halted': trialHalted,
  'trial-lifted': trialLifted,
  'trial-closed': trialClosed,
  invitation,
  'password-reset': passwordReset,
};

function messageOf<Kind extends MailKind>(payload: MailPayloadOf<Kind>): Message {
  return MESSAGES[payload.kind as Kind](payload);
}

/**
 * A mail of the outbox as it is sent: subject, HTML and text of one message.
 * @param kind the mail's kind, as its row says
 * @param payload what the row holds, parsed from JSON
 * @param context the installation's address and the reader's printed name
 * @throws z.ZodError when there is no such kind, or the payload is not one of it
 */
export function renderMail(
  kind: string,
  payload: unknown,
  context: MailContext,
): { subject: string; html: string; text: string } {
  const message = messageOf(parseMailPayload(kind, payload));
  return { subject: message.subject, html: asHtml(message, context), text: asText(message, context) };
}
