import { QueryTypes } from 'sequelize';
import { sessionEndsAt, sessionStands } from '@/lib/policy/session-times';
import { sequelize } from '@/lib/db/connection';
import type { Actor, MembershipGrant, TrialRole } from '@/lib/policy/roles';

/** A standing membership of the reader, with the trial as addresses and headings name it. */
export interface ReaderMembership extends MembershipGrant {
  readonly trialCode: string;
  readonly trialTitle: string;
}

/** Who asks, as read from the database at this request: the actor of every policy. */
export interface Reader extends Actor {
  readonly email: string;
  readonly memberships: readonly ReaderMembership[];
  /** The digest that names the session; not the secret value. */
  readonly sessionId: string;
  readonly sessionLastSeenAt: string;
  /** When the session ends whatever happens. */
  readonly sessionExpiresAt: string;
  /** When the session ends if nothing more is asked for. */
  readonly sessionEndsAt: string;
  /** The server's clock at this request; in a test installation with its offset. */
  readonly now: string;
  readonly installationKind: 'production' | 'demo' | 'test';
}

interface SessionRow {
  lastSeenAt: Date;
  expiresAt: Date;
  endedAt: Date | null;
  personId: string;
  email: string;
  printedName: string;
  isAdministrator: number;
  trialId: string | null;
  trialCode: string | null;
  trialTitle: string | null;
  role: TrialRole | null;
  siteId: string | null;
  kind: Reader['installationKind'];
  clockOffset: number;
}

/**
 * The reader behind a session, or null when the session has ended, ran out, or its person is not active any more.
 * One statement, whatever the number of trials.
 * @param sessionId the digest of the session's secret value
 * @param now the server's clock, in milliseconds since 1970
 */
export async function sessionReader(sessionId: string, now: number): Promise<Reader | null> {
  const rows: SessionRow[] = await sequelize().query(
    `SELECT s.last_seen_at AS lastSeenAt, s.expires_at AS expiresAt, s.ended_at AS endedAt,
       p.id AS personId, p.email, p.printed_name AS printedName, p.is_administrator AS isAdministrator,
       m.trial_id AS trialId, t.code AS trialCode, t.title AS trialTitle, m.role, k.site_id AS siteId,
       (SELECT i.kind FROM installation i WHERE i.id = 1) AS kind,
       (SELECT i.clock_offset_milliseconds FROM installation i WHERE i.id = 1) AS clockOffset
     FROM sessions s
     JOIN people p ON p.id = s.person_id AND p.state = 'active'
     LEFT JOIN memberships m ON m.person_id = p.id AND m.ended_at IS NULL
     LEFT JOIN trials t ON t.id = m.trial_id
     LEFT JOIN membership_sites k ON k.membership_id = m.id
     WHERE s.id = :sessionId
     ORDER BY t.code, k.site_id`,
    { type: QueryTypes.SELECT, replacements: { sessionId } },
  );
  const first = rows[0];
  if (first === undefined || !sessionStands(first, now)) return null;
  return {
    personId: first.personId,
    printedName: first.printedName,
    email: first.email,
    isAdministrator: Boolean(first.isAdministrator),
    memberships: membershipsOf(rows),
    sessionId,
    sessionLastSeenAt: first.lastSeenAt.toISOString(),
    sessionExpiresAt: first.expiresAt.toISOString(),
    sessionEndsAt: new Date(sessionEndsAt(first)).toISOString(),
    now: new Date(now + Number(first.clockOffset)).toISOString(),
    installationKind: first.kind,
  };
}

function membershipsOf(rows: readonly SessionRow[]): ReaderMembership[] {
  const byTrial = new Map<string, ReaderMembership & { siteIds: string[] }>();
  for (const { trialId, trialCode, trialTitle, role, siteId } of rows) {
    if (trialId === null || trialCode === null || trialTitle === null || role === null) continue;
    const membership = byTrial.get(trialId) ?? { trialId, trialCode, trialTitle, role, siteIds: [] };
    if (siteId !== null) membership.siteIds.push(siteId);
    byTrial.set(trialId, membership);
  }
  return [...byTrial.values()];
}
