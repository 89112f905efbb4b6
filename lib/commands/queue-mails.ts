import { models } from '@/lib/db/connection';
import { newId } from '@/lib/hash';
import type { MailKind, MailPayload } from '@/lib/schemas/mail-payloads';

/** A mail to be sent once per kind, cause and address. */
export interface QueuedMail {
  readonly kind: MailKind;
  /** The id of the event (or link) that causes it. */
  readonly cause: string;
  readonly personId: string | null;
  readonly address: string;
  readonly payload: MailPayload;
  /** 0 goes first. */
  readonly priority: number;
}

/** Writes mails to the outbox in the caller's transaction; the worker sends them after the commit. */
export async function queueMails(mails: readonly QueuedMail[], at: string): Promise<void> {
  if (mails.length === 0) return;
  await models().OutboxMail.bulkCreate(
    mails.map((mail) => {
      const id = newId();
      return {
        id,
        kind: mail.kind,
        cause: mail.cause,
        personId: mail.personId,
        address: mail.address,
        payload: JSON.stringify(mail.payload),
        priority: mail.priority,
        state: 'queued' as const,
        attempts: 0,
        leaseOwner: null,
        leaseUntil: null,
        nextAttemptAt: null,
        messageId: `<${id}@stepwell.invalid>`,
        lastError: null,
        createdAt: new Date(at),
        sentAt: null,
      };
    }),
  );
}
