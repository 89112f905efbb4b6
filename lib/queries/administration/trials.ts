import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';
import type { TrialRole } from '@/lib/policy/roles';

/** The most people offered for a role; an installation with more names them by searching first. */
const MOST_CANDIDATES = 1000;

/** A trial as the administrator sees it: no dose, no cohort, no outcome. */
export interface TrialLine {
  readonly code: string;
  readonly title: string;
  readonly state: string;
  readonly createdAt: string;
  readonly members: number;
  readonly sites: number;
}

/** A person who may be given a role in a trial. */
export interface Candidate {
  readonly personId: string;
  readonly printedName: string;
  readonly email: string;
  readonly state: 'invited' | 'active';
}

/** Every trial with the size of its team: one statement. */
export async function trialList(): Promise<TrialLine[]> {
  const rows = await sequelize().query<Omit<TrialLine, 'createdAt'> & { createdAt: Date }>(
    `SELECT t.code, t.title, t.state, t.created_at AS createdAt,
       (SELECT COUNT(*) FROM memberships m WHERE m.trial_id = t.id AND m.ended_at IS NULL) AS members,
       (SELECT COUNT(*) FROM trial_sites x WHERE x.trial_id = t.id) AS sites
     FROM trials t ORDER BY t.code`,
    { type: QueryTypes.SELECT },
  );
  return rows.map((row) => ({ ...row, createdAt: row.createdAt.toISOString() }));
}

/** The people who may be given a role in a trial, by name: one statement. */
export function candidates(): Promise<Candidate[]> {
  return sequelize().query<Candidate>(
    `SELECT id AS personId, printed_name AS printedName, email, state FROM people
     WHERE state IN ('invited', 'active') AND NOT is_administrator
     ORDER BY printed_name, email LIMIT ${MOST_CANDIDATES}`,
    { type: QueryTypes.SELECT },
  );
}

/** A trial's team as the administrator sees it. */
export interface TrialTeamPage {
  readonly code: string;
  readonly title: string;
  readonly state: string;
  readonly quorum: number;
  readonly sites: readonly {
    readonly siteId: string;
    readonly code: string;
    readonly name: string;
    readonly timeZone: string;
    readonly state: string;
  }[];
  readonly sitesToAdd: readonly { readonly siteId: string; readonly code: string; readonly name: string }[];
  readonly members: readonly {
    readonly personId: string;
    readonly printedName: string;
    readonly email: string;
    readonly personState: string;
    readonly role: TrialRole;
    readonly sites: readonly string[];
    readonly grantedAt: string;
    readonly endedAt: string | null;
  }[];
}

interface SiteRow {
  code: string;
  title: string;
  state: string;
  quorum: number;
  siteId: string | null;
  siteCode: string | null;
  siteName: string | null;
  timeZone: string | null;
  siteState: string | null;
}

interface MemberRow {
  personId: string;
  printedName: string;
  email: string;
  personState: string;
  role: TrialRole;
  sites: string | null;
  grantedAt: Date;
  endedAt: Date | null;
}

/**
 * A trial's sites and team, and the sites it may take in: two statements.
 * @returns null when there is no such trial
 */
export async function trialTeamPage(code: string): Promise<TrialTeamPage | null> {
  const select = { type: QueryTypes.SELECT as const, replacements: { code } };
  const siteRows = await sequelize().query<SiteRow>(
    `SELECT t.code, t.title, t.state, t.quorum, s.id AS siteId, s.code AS siteCode, s.name AS siteName,
       s.time_zone AS timeZone, x.state AS siteState
     FROM trials t
     LEFT JOIN sites s ON TRUE
     LEFT JOIN trial_sites x ON x.trial_id = t.id AND x.site_id = s.id
     WHERE t.code = :code ORDER BY s.code`,
    select,
  );
  const trial = siteRows[0];
  if (trial === undefined) return null;
  const memberRows = await sequelize().query<MemberRow>(
    `SELECT p.id AS personId, p.printed_name AS printedName, p.email, p.state AS personState, m.role,
       m.granted_at AS grantedAt, m.ended_at AS endedAt,
       (SELECT GROUP_CONCAT(s.code ORDER BY s.code SEPARATOR ', ') FROM membership_sites k
         JOIN sites s ON s.id = k.site_id WHERE k.membership_id = m.id) AS sites
     FROM trials t
     JOIN memberships m ON m.trial_id = t.id
     JOIN people p ON p.id = m.person_id
     WHERE t.code = :code ORDER BY m.ended_at IS NOT NULL, m.role, p.printed_name`,
    select,
  );
  const sites = siteRows.flatMap(({ siteId, siteCode, siteName, timeZone, siteState }) =>
    siteId === null || siteCode === null || siteName === null || timeZone === null
      ? []
      : [{ siteId, code: siteCode, name: siteName, timeZone, state: siteState }],
  );
  return {
    code: trial.code,
    title: trial.title,
    state: trial.state,
    quorum: trial.quorum,
    sites: sites.flatMap((site) => (site.state === null ? [] : [{ ...site, state: site.state }])),
    sitesToAdd: sites
      .filter((site) => site.state === null)
      .map(({ siteId, code: siteCode, name }) => ({ siteId, code: siteCode, name })),
    members: memberRows.map(({ sites: codes, grantedAt, endedAt, ...row }) => ({
      ...row,
      sites: codes === null ? [] : codes.split(', '),
      grantedAt: grantedAt.toISOString(),
      endedAt: endedAt?.toISOString() ?? null,
    })),
  };
}
