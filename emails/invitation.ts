import type { MailPayloadOf } from '@/lib/schemas/mail-payloads';
import { linkPath } from '@/lib/schemas/one-time-link';
import { action, paragraph } from './blocks';
import type { Message } from './message';
import { utcTime } from './utc-time';

/** To a new person: a link that works once, to choose a password. */
export function invitation({ token, expiresAt }: MailPayloadOf<'invitation'>): Message {
  return {
    subject: 'Your account in Stepwell',
    preheader: 'Choose a password to begin.',
    title: 'An account was made for you',
    tone: 'plain',
    blocks: [
      paragraph(
        'An administrator of this installation of Stepwell has made an account for you at this address.',
        'Choose a password to begin.',
      ),
      action('Choose a password', linkPath('invitation', token)),
      paragraph(
        `The link works once, until ${utcTime(expiresAt)}. After that, ask the administrator for a new one.`,
        'Do not forward this message: who has the link can take the account.',
      ),
      paragraph('If you do not know what this is about, do nothing and tell the administrator.'),
    ],
    because: 'an administrator entered this address',
    chainHead: null,
  };
}
