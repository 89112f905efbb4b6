import { linkExpiry } from '@/lib/conduct/installation/links';
import { linkMailSchema } from '@/lib/schemas/mail-payloads';
import type { QueuedMail } from '../queue-mails';

/**
 * The mail that carries a person's link. Its cause is the link's digest, so that the worker can see whether the link
 * still works. The token stands in the payload only until the mail is sent, overtaken or given up.
 */
export function linkMail(
  kind: 'invitation' | 'password-reset',
  link: { readonly token: string; readonly digest: string },
  to: { readonly id: string; readonly email: string },
  now: string,
): QueuedMail {
  return {
    kind,
    cause: link.digest,
    personId: to.id,
    address: to.email,
    payload: linkMailSchema.parse({
      kind,
      purpose: kind,
      token: link.token,
      expiresAt: linkExpiry(kind, now),
    }),
    priority: 3,
  };
}
