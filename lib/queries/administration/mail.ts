import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';
import { environment } from '@/lib/env';

/** The most mails one page lists, the newest first. */
export const MOST_MAILS_LISTED = 200;

export const MAIL_STATES = ['queued', 'sent', 'overtaken', 'dead'] as const;
export type MailState = (typeof MAIL_STATES)[number];

/** A mail of the outbox without its content: what it says is its reader's, not the administrator's. */
export interface MailLine {
  readonly mailId: string;
  readonly kind: string;
  readonly address: string;
  readonly state: MailState;
  readonly attempts: number;
  readonly lastError: string | null;
  readonly createdAt: string;
  readonly sentAt: string | null;
  readonly nextAttemptAt: string | null;
}

export interface MailList {
  readonly counts: Readonly<Record<MailState, number>>;
  readonly mails: readonly MailLine[];
}

interface MailRow extends Omit<MailLine, 'createdAt' | 'sentAt' | 'nextAttemptAt'> {
  createdAt: Date;
  sentAt: Date | null;
  nextAttemptAt: Date | null;
}

/**
 * The newest mails of the outbox, and how many there are in each state: two statements.
 * @param state only mails in this state; all of them when null
 */
export async function mailList(state: MailState | null): Promise<MailList> {
  const counted = await sequelize().query<{ state: MailState; count: number }>(
    'SELECT state, COUNT(*) AS count FROM outbox GROUP BY state',
    { type: QueryTypes.SELECT },
  );
  const rows = await sequelize().query<MailRow>(
    `SELECT id AS mailId, kind, address, state, attempts, last_error AS lastError, created_at AS createdAt,
       sent_at AS sentAt, IF(state = 'queued', next_attempt_at, NULL) AS nextAttemptAt
     FROM outbox WHERE :state IS NULL OR state = :state
     ORDER BY created_at DESC, id DESC LIMIT ${MOST_MAILS_LISTED}`,
    { type: QueryTypes.SELECT, replacements: { state } },
  );
  const counts: Record<MailState, number> = { queued: 0, sent: 0, overtaken: 0, dead: 0 };
  for (const { state: each, count } of counted) counts[each] = count;
  return {
    counts,
    mails: rows.map((row) => ({
      ...row,
      createdAt: row.createdAt.toISOString(),
      sentAt: row.sentAt?.toISOString() ?? null,
      nextAttemptAt: row.nextAttemptAt?.toISOString() ?? null,
    })),
  };
}

/** Whether mail waits until a mail server is configured; a demo or a test catches it instead. */
export function mailIsHeld(installationKind: 'production' | 'demo' | 'test'): boolean {
  return installationKind === 'production' && environment().smtpUrl === undefined;
}
