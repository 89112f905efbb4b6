import type { MailContext, Message } from '../message';

/** What stands at a mail's foot: for whom it is and why, the state of the record it tells of, who sent it. */
export function footerSentences(message: Message, { url, recipientName }: MailContext) {
  return {
    reader: `For ${recipientName ?? 'the owner of this address'}, because ${message.because}.`,
    record:
      message.chainHead === null
        ? null
        : { label: 'Head of the trial’s record when this happened:', head: message.chainHead },
    sender: `Sent by Stepwell at ${url}. Nobody reads answers to this message; put no subject’s data into one.`,
  };
}
