import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';

/** A site as the list of sites shows it. */
export interface SiteLine {
  readonly siteId: string;
  readonly code: string;
  readonly name: string;
  readonly timeZone: string;
  readonly createdAt: string;
  /** Codes of the trials it takes part in. */
  readonly trials: readonly string[];
}

/** Every site with its trials: one statement. */
export async function siteList(): Promise<SiteLine[]> {
  const rows = await sequelize().query<
    Omit<SiteLine, 'createdAt' | 'trials'> & { createdAt: Date; trialCode: string | null }
  >(
    `SELECT s.id AS siteId, s.code, s.name, s.time_zone AS timeZone, s.created_at AS createdAt, t.code AS trialCode
     FROM sites s
     LEFT JOIN trial_sites x ON x.site_id = s.id
     LEFT JOIN trials t ON t.id = x.trial_id
     ORDER BY s.code, t.code`,
    { type: QueryTypes.SELECT },
  );
  const byId = new Map<string, SiteLine & { trials: string[] }>();
  for (const { trialCode, createdAt, ...row } of rows) {
    const line = byId.get(row.siteId) ?? { ...row, createdAt: createdAt.toISOString(), trials: [] };
    if (trialCode !== null) line.trials.push(trialCode);
    byId.set(row.siteId, line);
  }
  return [...byId.values()];
}
