import { LINK_MAIL_KINDS } from '@/lib/schemas/one-time-link';
import {
  type InstallationContext,
  type InstallationPayloads,
  refuse,
  requireAdministrator,
} from './decision';

/** Puts a mail that was given up back into the queue. */
export function retryMail(
  mail: { readonly id: string; readonly kind: string; readonly state: string },
  context: InstallationContext,
): InstallationPayloads {
  requireAdministrator(context);
  if (mail.state !== 'dead') {
    refuse('refused', 'Not queued again. Only a mail that was given up can be tried again.');
  }
  if (LINK_MAIL_KINDS.some((kind) => kind === mail.kind)) {
    refuse(
      'refused',
      'Not queued again. The link of this mail was wiped when the mail was given up; send a new one from the person’s page.',
    );
  }
  return [{ kind: 'mail-queued-again', mailId: mail.id }];
}
