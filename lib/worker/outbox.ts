import { QueryTypes } from 'sequelize';
import { sequelize } from '../db/connection';
import { inTransaction } from '../db/transaction';

/** How long a claimed mail belongs to its worker. Sending gives up well before (lib/worker/send.ts). */
export const LEASE_SECONDS = 120;
/** Tries after which a mail that the mail server itself refuses is given up and shown to the administrator. */
export const MOST_REFUSALS = 8;
const FIRST_PAUSE_SECONDS = 5;
const LONGEST_PAUSE_SECONDS = 600;

/** A mail that this worker alone may send until its lease ends. */
export interface ClaimedMail {
  readonly id: string;
  readonly kind: string;
  readonly cause: string;
  readonly personId: string | null;
  readonly address: string;
  readonly payload: string;
  readonly messageId: string;
  readonly leaseOwner: string;
  /** Which try this is, from 1; with the owner it says whose claim a write-back belongs to. */
  readonly attempts: number;
}

/** What may be claimed now, by the database's clock: two workers' clocks may differ. */
const CLAIMABLE = `state = 'queued'
  AND (next_attempt_at IS NULL OR next_attempt_at <= UTC_TIMESTAMP(6))
  AND (lease_until IS NULL OR lease_until < UTC_TIMESTAMP(6))`;

/**
 * Claims the next mail: the lowest priority number first (halts), then the oldest. The claim is an UPDATE,
 * committed before anything is sent; of two workers that choose the same mail, one changes no row and takes
 * the next. A lock held while sending would not do: on two nodes of a cluster both would hold it.
 * @param owner names this worker
 * @returns the mail, or null when none waits
 */
export async function claimMail(owner: string): Promise<ClaimedMail | null> {
  const candidates = await sequelize().query<{ id: string }>(
    `SELECT id FROM outbox WHERE ${CLAIMABLE} ORDER BY priority, created_at, id LIMIT 20`,
    { type: QueryTypes.SELECT },
  );
  for (const { id } of candidates) {
    const claimed = await inTransaction(() =>
      sequelize().query(
        `UPDATE outbox
         SET lease_owner = :owner, lease_until = UTC_TIMESTAMP(6) + INTERVAL ${LEASE_SECONDS} SECOND,
             attempts = attempts + 1
         WHERE id = :id AND ${CLAIMABLE}`,
        { type: QueryTypes.BULKUPDATE, replacements: { owner, id } },
      ),
    );
    if (claimed === 1) return readClaim(id, owner);
  }
  return null;
}

async function readClaim(id: string, owner: string): Promise<ClaimedMail | null> {
  const rows = await sequelize().query<ClaimedMail>(
    `SELECT id, kind, cause, person_id AS personId, address, payload, message_id AS messageId,
            lease_owner AS leaseOwner, attempts
     FROM outbox WHERE id = :id AND lease_owner = :owner AND state = 'queued'`,
    { type: QueryTypes.SELECT, replacements: { id, owner } },
  );
  return rows[0] ?? null;
}

/** A mail that has come to its end keeps no link's token: who reads the table later could not use it. */
const WITHOUT_TOKEN = `payload = IF(JSON_EXISTS(payload, '$.token'), JSON_REMOVE(payload, '$.token'), payload)`;

/** Writes a change to a claimed mail, when the claim is still this worker's; says whether it was. */
async function writeBack(
  mail: ClaimedMail,
  change: string,
  values: Record<string, unknown>,
): Promise<boolean> {
  const written = await inTransaction(
    () =>
      sequelize().query(
        `UPDATE outbox SET lease_owner = NULL, lease_until = NULL, ${change}
         WHERE id = :id AND lease_owner = :owner AND attempts = :attempts AND state = 'queued'`,
        {
          type: QueryTypes.BULKUPDATE,
          replacements: { ...values, id: mail.id, owner: mail.leaseOwner, attempts: mail.attempts },
        },
      ),
    { repeatable: true },
  );
  return written === 1;
}

/** Marks a mail as handed over to the mail server. False when another worker has claimed it since. */
export function markSent(mail: ClaimedMail): Promise<boolean> {
  return writeBack(
    mail,
    `state = 'sent', sent_at = UTC_TIMESTAMP(3), last_error = NULL, ${WITHOUT_TOKEN}`,
    {},
  );
}

/** Marks a mail whose cause no longer holds: it is not sent. */
export function markOvertaken(mail: ClaimedMail): Promise<boolean> {
  return writeBack(mail, `state = 'overtaken', last_error = NULL, ${WITHOUT_TOKEN}`, {});
}

/**
 * Puts a mail back after a failure, to be tried later; the pause doubles up to ten minutes.
 * @param reason kept with the mail for the administrator, cut to 500 characters
 * @param isRefusal true when the mail itself was refused: then it is given up after `MOST_REFUSALS` tries. A mail
 *   server that is down is no refusal: a mail waits for it however long it takes.
 */
export function markFailed(mail: ClaimedMail, reason: string, isRefusal: boolean): Promise<boolean> {
  const state = isRefusal && mail.attempts >= MOST_REFUSALS ? 'dead' : 'queued';
  const seconds = Math.min(LONGEST_PAUSE_SECONDS, FIRST_PAUSE_SECONDS * 2 ** Math.min(mail.attempts - 1, 10));
  return writeBack(
    mail,
    `state = :state, last_error = :reason, next_attempt_at = UTC_TIMESTAMP(6) + INTERVAL :seconds SECOND
     ${state === 'dead' ? `, ${WITHOUT_TOKEN}` : ''}`,
    { state, reason: reason.slice(0, 500), seconds },
  );
}
