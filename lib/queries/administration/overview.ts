import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';

/** What the installation holds, in counts. */
export interface AdministrationOverview {
  readonly people: { readonly active: number; readonly invited: number; readonly disabled: number };
  /** Active administrators among the active people. */
  readonly administrators: number;
  /** Invited people none of whose links works any more. */
  readonly staleInvitations: number;
  readonly sites: number;
  readonly trials: number;
  readonly mail: {
    readonly queued: number;
    readonly sent: number;
    readonly overtaken: number;
    readonly dead: number;
  };
  readonly oldestQueuedAt: string | null;
  readonly trail: { readonly events: number; readonly head: string; readonly lastEventAt: string | null };
}

type CountsRow = Record<
  | 'active'
  | 'invited'
  | 'disabled'
  | 'administrators'
  | 'staleInvitations'
  | 'sites'
  | 'trials'
  | 'queued'
  | 'sent'
  | 'overtaken'
  | 'dead'
  | 'chainSequence',
  number
> & { oldestQueuedAt: Date | null; chainHead: string; chainTime: Date | null };

/** Reads the counts in one statement. */
export async function administrationOverview(): Promise<AdministrationOverview> {
  const rows = await sequelize().query<CountsRow>(
    `SELECT p.*, m.*,
       (SELECT COUNT(*) FROM sites) AS sites,
       (SELECT COUNT(*) FROM trials) AS trials,
       i.chain_sequence AS chainSequence, i.chain_head AS chainHead, i.chain_time AS chainTime
     FROM installation i
     JOIN (SELECT
         COALESCE(SUM(q.state = 'active'), 0) AS active,
         COALESCE(SUM(q.state = 'invited'), 0) AS invited,
         COALESCE(SUM(q.state = 'disabled'), 0) AS disabled,
         COALESCE(SUM(q.state = 'active' AND q.is_administrator), 0) AS administrators,
         COALESCE(SUM(q.state = 'invited' AND NOT EXISTS (SELECT 1 FROM one_time_links l
           JOIN installation k ON k.id = 1
           WHERE l.person_id = q.id AND l.used_at IS NULL
             AND l.expires_at > TIMESTAMPADD(MICROSECOND, k.clock_offset_milliseconds * 1000, UTC_TIMESTAMP(3)))), 0)
           AS staleInvitations
       FROM people q) p
     JOIN (SELECT
         COALESCE(SUM(o.state = 'queued'), 0) AS queued,
         COALESCE(SUM(o.state = 'sent'), 0) AS sent,
         COALESCE(SUM(o.state = 'overtaken'), 0) AS overtaken,
         COALESCE(SUM(o.state = 'dead'), 0) AS dead,
         MIN(IF(o.state = 'queued', o.created_at, NULL)) AS oldestQueuedAt
       FROM outbox o) m
     WHERE i.id = 1`,
    { type: QueryTypes.SELECT },
  );
  const row = rows[0];
  if (row === undefined)
    throw new Error('The database has no installation row; it was not migrated to its end.');
  return {
    people: { active: Number(row.active), invited: Number(row.invited), disabled: Number(row.disabled) },
    administrators: Number(row.administrators),
    staleInvitations: Number(row.staleInvitations),
    sites: row.sites,
    trials: row.trials,
    mail: {
      queued: Number(row.queued),
      sent: Number(row.sent),
      overtaken: Number(row.overtaken),
      dead: Number(row.dead),
    },
    oldestQueuedAt: row.oldestQueuedAt?.toISOString() ?? null,
    trail: {
      events: row.chainSequence,
      head: row.chainHead,
      lastEventAt: row.chainTime?.toISOString() ?? null,
    },
  };
}
