import { QueryTypes } from 'sequelize';
import { z } from 'zod';
import { sequelize } from '../db/connection';
import type { ClaimedMail } from './outbox';

/** The ids a mail's payload may name; what a kind needs of them is checked where it is used. */
const payloadSchema = z.looseObject({
  trialCode: z.string().optional(),
  recommendationId: z.string().optional(),
  releaseId: z.string().optional(),
  haltId: z.string().optional(),
});
type Payload = z.infer<typeof payloadSchema>;

/**
 * For each kind of mail the question whose answer must be yes for it to be sent, as a query that finds a row.
 * A kind that is not named here tells of something that cannot be overtaken.
 */
const CAUSES: Readonly<Record<string, string>> = {
  'design-submitted': `SELECT 1 FROM trials t JOIN design_versions v ON v.trial_id = t.id
    WHERE t.code = :trialCode AND v.state = 'submitted'`,
  'design-returned': `SELECT 1 FROM trials t JOIN design_versions v ON v.trial_id = t.id
    WHERE t.code = :trialCode AND v.state = 'draft'`,
  'recommendation-ready': `SELECT 1 FROM recommendations WHERE id = :recommendationId AND state = 'awaiting'`,
  // A dose letter counts while its cohort is open in a trial that is open: not halted, not closed, not signed since.
  'dose-released': `SELECT 1 FROM cohorts c JOIN trials t ON t.id = c.trial_id
    WHERE c.release_id = :releaseId AND c.state = 'open' AND t.state = 'open'`,
  'dose-released-summary': `SELECT 1 FROM cohorts c JOIN trials t ON t.id = c.trial_id
    WHERE c.release_id = :releaseId AND c.state <> 'cancelled' AND t.state = 'open'`,
  'trial-halted': 'SELECT 1 FROM halts WHERE id = :haltId AND lifted_at IS NULL',
  'trial-lifted': `SELECT 1 FROM trials WHERE code = :trialCode AND state = 'open'`,
};

/** A person who left a trial, or was disabled, gets no more of its mails. */
const STILL_A_READER = `SELECT 1 FROM people p
  JOIN memberships m ON m.person_id = p.id AND m.ended_at IS NULL
  JOIN trials t ON t.id = m.trial_id AND t.code = :trialCode
  WHERE p.id = :personId AND p.state = 'active'`;

async function findsRow(sql: string, replacements: Record<string, unknown>): Promise<boolean> {
  const rows = await sequelize().query(`${sql} LIMIT 1`, { type: QueryTypes.SELECT, replacements });
  return rows.length > 0;
}

/**
 * Whether the cause of a mail still holds, asked right before it is sent: a dose letter overtaken by a halt stays
 * unsent, and so does a mail about a trial to somebody who has left it.
 * @throws Error when the payload lacks an id that its kind needs
 */
export async function stillHolds(mail: ClaimedMail): Promise<boolean> {
  const payload: Payload = payloadSchema.parse(JSON.parse(mail.payload));
  if (payload.trialCode !== undefined && mail.personId !== null) {
    const isReader = await findsRow(STILL_A_READER, {
      trialCode: payload.trialCode,
      personId: mail.personId,
    });
    if (!isReader) return false;
  }
  const question = CAUSES[mail.kind];
  return question === undefined || findsRow(question, payload);
}
