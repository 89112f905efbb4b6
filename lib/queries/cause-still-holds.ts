import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';
import { sha256 } from '@/lib/hash';
import { type MailPayload, parseMailPayload, type TrialNotice } from '@/lib/schemas/mail-payloads';
import { sqlTime } from './sql-time';

type TrialNoticeKind = TrialNotice['kind'];

/**
 * What must be true of the trial t for a notice still to be sent. A halt is always told, a lifted one too: who was to
 * stop must be able to see that somebody wanted it. A dose letter counts while subjects may be dosed on it.
 */
const TRIAL_CONDITIONS: Readonly<Record<TrialNoticeKind, string>> = {
  'design-submitted': `EXISTS (SELECT 1 FROM design_versions v
    WHERE v.id = :versionId AND v.trial_id = t.id AND v.state = 'submitted' AND v.submitted_at = :occurredAt)`,
  'design-returned': `EXISTS (SELECT 1 FROM design_versions v
    WHERE v.id = :versionId AND v.trial_id = t.id AND v.state = 'draft')`,
  'recommendation-ready': `EXISTS (SELECT 1 FROM recommendations r
    WHERE r.id = :recommendationId AND r.trial_id = t.id AND r.state = 'awaiting')`,
  'dose-released': `t.state = 'open' AND EXISTS (SELECT 1 FROM cohorts c
    WHERE c.release_id = :releaseId AND c.trial_id = t.id AND c.state = 'open'
      AND NOT c.is_records_only AND NOT c.is_closed_short)`,
  'dose-released-summary': `t.state = 'open' AND EXISTS (SELECT 1 FROM cohorts c
    WHERE c.release_id = :releaseId AND c.trial_id = t.id AND c.state IN ('open', 'under-review'))`,
  'packet-returned': `EXISTS (SELECT 1 FROM cohorts c
    WHERE c.number = :cohortNumber AND c.trial_id = t.id AND c.state = 'open' AND c.is_records_only)`,
  'trial-halted': 'TRUE',
  'trial-lifted': `t.state <> 'halted'`,
  'trial-closed': `t.state IN ('closed', 'locked')`,
};

/** The reader still has a role in the trial and an account that works, and the notice's own condition holds. */
const trialQuestion = (kind: TrialNoticeKind): string => `SELECT 1 FROM trials t
  JOIN memberships m ON m.trial_id = t.id AND m.person_id = :personId AND m.ended_at IS NULL
  JOIN people p ON p.id = m.person_id AND p.state = 'active'
  WHERE t.code = :trialCode AND ${TRIAL_CONDITIONS[kind]}
  LIMIT 1`;

/** The link was not used, replaced or outrun by the installation's clock. */
const LINK_QUESTION = `SELECT 1 FROM one_time_links l
  JOIN installation i ON i.id = 1
  WHERE l.token_digest = :tokenDigest AND l.purpose = :kind AND l.used_at IS NULL
    AND l.expires_at > TIMESTAMPADD(MICROSECOND, i.clock_offset_milliseconds * 1000, UTC_TIMESTAMP(3))
  LIMIT 1`;

function questionOf(payload: MailPayload): { sql: string; values: Record<string, unknown> } {
  switch (payload.kind) {
    case 'invitation':
    case 'password-reset':
      return { sql: LINK_QUESTION, values: { kind: payload.kind, tokenDigest: sha256(payload.token) } };
    default:
      return {
        sql: trialQuestion(payload.kind),
        values: { ...payload, occurredAt: sqlTime(Date.parse(payload.occurredAt)) },
      };
  }
}

/**
 * Whether the cause of a mail still holds, asked right before it is sent: a dose letter overtaken by a halt or by the
 * cohort's end stays unsent, and so does a notice to somebody who has left the trial. One statement.
 * @param mail.payload what the outbox row holds, parsed from JSON
 * @throws z.ZodError when there is no such kind of mail, or the payload is not one of it
 */
export async function causeStillHolds(mail: {
  readonly kind: string;
  readonly personId: string | null;
  readonly payload: unknown;
}): Promise<boolean> {
  const { sql, values } = questionOf(parseMailPayload(mail.kind, mail.payload));
  const rows = await sequelize().query(sql, {
    type: QueryTypes.SELECT,
    replacements: { ...values, personId: mail.personId },
  });
  return rows.length > 0;
}
