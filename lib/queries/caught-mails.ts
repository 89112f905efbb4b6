import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';

/** Caught mails one page lists, the newest first. */
export const CAUGHT_MAILS_A_PAGE = 50;
/** Recipients offered to choose from, in the order of their last mail. */
const MOST_RECIPIENTS = 200;

/** Mail is caught, and shown to whoever comes, in demo and test installations only. */
const CATCHES = `EXISTS (SELECT 1 FROM installation i WHERE i.id = 1 AND i.kind <> 'production')`;

export interface CaughtMailLine {
  readonly id: number;
  readonly receivedAt: string;
  readonly to: string;
  readonly subject: string;
}

export interface CaughtMailList {
  readonly mails: readonly CaughtMailLine[];
  readonly recipients: readonly { readonly address: string; readonly count: number }[];
  /** The id to ask for as `before` to see older mails, or null when there are none. */
  readonly olderThan: number | null;
}

interface Line {
  id: number;
  receivedAt: Date;
  to: string;
  subject: string;
}

const plainLine = <Row extends Line>(row: Row) => ({ ...row, receivedAt: row.receivedAt.toISOString() });

/**
 * The caught mails, the newest first: three statements.
 * @param filter.to only mails to this address; all of them when null
 * @param filter.before only mails older than the one of this id
 * @returns null in an installation that catches no mail
 */
export async function caughtMails(filter: {
  readonly to: string | null;
  readonly before: number | null;
}): Promise<CaughtMailList | null> {
  const select = <Row extends object>(sql: string): Promise<Row[]> =>
    sequelize().query<Row>(sql, { type: QueryTypes.SELECT, replacements: { ...filter } });
  const [{ catches } = { catches: 0 }] = await select<{ catches: number }>(`SELECT ${CATCHES} AS catches`);
  if (!catches) return null;
  const rows = await select<Line>(
    `SELECT id, received_at AS receivedAt, envelope_to AS \`to\`, subject FROM caught_mails
     WHERE (:to IS NULL OR envelope_to = :to) AND (:before IS NULL OR id < :before)
     ORDER BY id DESC LIMIT ${CAUGHT_MAILS_A_PAGE + 1}`,
  );
  const recipients = await select<{ address: string; count: number }>(
    `SELECT envelope_to AS address, COUNT(*) AS count FROM caught_mails
     GROUP BY envelope_to ORDER BY MAX(id) DESC LIMIT ${MOST_RECIPIENTS}`,
  );
  const mails = rows.slice(0, CAUGHT_MAILS_A_PAGE).map(plainLine);
  return {
    mails,
    recipients,
    olderThan: rows.length > CAUGHT_MAILS_A_PAGE ? (mails.at(-1)?.id ?? null) : null,
  };
}

export interface CaughtMailContent extends CaughtMailLine {
  readonly text: string;
  readonly html: string;
}

/** One caught mail with what it says; null when there is none, or the installation catches no mail. One statement. */
export async function caughtMail(id: number): Promise<CaughtMailContent | null> {
  const [row] = await sequelize().query<Line & { text: string; html: string }>(
    `SELECT id, received_at AS receivedAt, envelope_to AS \`to\`, subject, text, html FROM caught_mails
     WHERE id = :id AND ${CATCHES}`,
    { type: QueryTypes.SELECT, replacements: { id } },
  );
  return row ? plainLine(row) : null;
}
