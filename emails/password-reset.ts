import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { linkPath } from '@/lib/schemas/one-time-link';
import { action, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To a person who asked for it, or whose password an administrator reset: a link that works once. */
export function passwordReset({ token, expiresAt }: MailPayloadOf<'password-reset'>): Message {
  return {
    subject: 'Choose a new password for Stepwell',
    preheader: 'The link works once.',
    title: 'Choose a new password',
    tone: 'plain',
    blocks: [
      paragraph('A new password was asked for, for the account at this address.'),
      action('Choose a new password', linkPath('password-reset', token)),
      paragraph(
        `The link works once, until ${utcTime(expiresAt)}. After that, ask for a new one on the sign-in page.`,
        'Do not forward this message: who has the link can take the account.',
      ),
      paragraph(
        'If you did not ask for it, do nothing: your password stays as it is. Tell the administrator if it happens again.',
      ),
    ],
    because: 'it is the address of an account',
    chainHead: null,
  };
}
