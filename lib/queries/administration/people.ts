import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';
import type { TrialRole } from '@/lib/policy/roles';

/** The most people one page lists; a search narrows them. */
export const MOST_PEOPLE_LISTED = 200;

/** A person as the list of people shows them. */
export interface PersonLine {
  readonly personId: string;
  readonly printedName: string;
  readonly email: string;
  readonly state: 'invited' | 'active' | 'disabled';
  readonly isAdministrator: boolean;
  readonly createdAt: string;
  /** Standing roles in trials, by the trial's code. */
  readonly roles: readonly { readonly trialCode: string; readonly role: TrialRole }[];
}

export interface PeopleList {
  readonly people: readonly PersonLine[];
  /** How many people the search finds; more than are listed when the list is cut. */
  readonly found: number;
}

interface PersonRow {
  personId: string;
  printedName: string;
  email: string;
  state: PersonLine['state'];
  isAdministrator: number;
  createdAt: Date;
  trialCode: string | null;
  role: TrialRole | null;
  found: number;
}

/** A text as a part of a LIKE pattern that stands for itself. */
function likePart(text: string): string {
  return `%${text.replace(/[\\%_]/g, (mark) => `\\${mark}`)}%`;
}

/**
 * The people of the installation by name, with their standing roles: one statement, whatever their number.
 * @param search a part of a name or an address; all people when empty
 */
export async function peopleList(search: string): Promise<PeopleList> {
  const rows = await sequelize().query<PersonRow>(
    `SELECT p.id AS personId, p.printed_name AS printedName, p.email, p.state,
       p.is_administrator AS isAdministrator, p.created_at AS createdAt, p.found, t.code AS trialCode, m.role
     FROM (SELECT q.*, COUNT(*) OVER () AS found FROM people q
       WHERE :search = '' OR q.printed_name LIKE :pattern OR q.email LIKE :pattern
       ORDER BY q.printed_name, q.id LIMIT ${MOST_PEOPLE_LISTED}) p
     LEFT JOIN memberships m ON m.person_id = p.id AND m.ended_at IS NULL
     LEFT JOIN trials t ON t.id = m.trial_id
     ORDER BY p.printed_name, p.id, t.code`,
    { type: QueryTypes.SELECT, replacements: { search, pattern: likePart(search) } },
  );
  const byId = new Map<string, PersonLine & { roles: { trialCode: string; role: TrialRole }[] }>();
  for (const { found: _found, trialCode, role, ...row } of rows) {
    const line = byId.get(row.personId) ?? {
      ...row,
      isAdministrator: Boolean(row.isAdministrator),
      createdAt: row.createdAt.toISOString(),
      roles: [],
    };
    if (trialCode !== null && role !== null) line.roles.push({ trialCode, role });
    byId.set(row.personId, line);
  }
  return { people: [...byId.values()], found: Number(rows[0]?.found ?? 0) };
}

/** One person as their page shows them: the account, never what they did in a trial. */
export interface PersonPage extends Omit<PersonLine, 'roles'> {
  readonly memberships: readonly {
    readonly trialCode: string;
    readonly trialTitle: string;
    readonly role: TrialRole;
    readonly sites: readonly string[];
    readonly grantedAt: string;
    readonly endedAt: string | null;
  }[];
  /** When the newest link of the person that still works was made, and until when it works. */
  readonly link: { readonly purpose: string; readonly createdAt: string; readonly expiresAt: string } | null;
  readonly openSessions: number;
}

interface PersonPageRow extends Omit<PersonRow, 'found'> {
  trialTitle: string | null;
  grantedAt: Date | null;
  endedAt: Date | null;
  sites: string | null;
  linkPurpose: string | null;
  linkCreatedAt: Date | null;
  linkExpiresAt: Date | null;
  openSessions: number;
}

/**
 * A person with their roles, their standing link and how often they are signed in: one statement.
 * @returns null when there is no such person
 */
export async function personPage(personId: string): Promise<PersonPage | null> {
  const rows = await sequelize().query<PersonPageRow>(
    `SELECT p.id AS personId, p.printed_name AS printedName, p.email, p.state,
       p.is_administrator AS isAdministrator, p.created_at AS createdAt,
       t.code AS trialCode, t.title AS trialTitle, m.role, m.granted_at AS grantedAt, m.ended_at AS endedAt,
       (SELECT GROUP_CONCAT(s.code ORDER BY s.code SEPARATOR ', ') FROM membership_sites k
         JOIN sites s ON s.id = k.site_id WHERE k.membership_id = m.id) AS sites,
       l.purpose AS linkPurpose, l.created_at AS linkCreatedAt, l.expires_at AS linkExpiresAt,
       (SELECT COUNT(*) FROM sessions z WHERE z.person_id = p.id AND z.ended_at IS NULL
         AND z.expires_at > UTC_TIMESTAMP(3)) AS openSessions
     FROM people p
     LEFT JOIN memberships m ON m.person_id = p.id
     LEFT JOIN trials t ON t.id = m.trial_id
     LEFT JOIN one_time_links l ON l.token_digest = (SELECT n.token_digest FROM one_time_links n
       JOIN installation i ON i.id = 1
       WHERE n.person_id = p.id AND n.used_at IS NULL
         AND n.expires_at > TIMESTAMPADD(MICROSECOND, i.clock_offset_milliseconds * 1000, UTC_TIMESTAMP(3))
       ORDER BY n.created_at DESC LIMIT 1)
     WHERE p.id = :personId ORDER BY m.ended_at IS NOT NULL, t.code`,
    { type: QueryTypes.SELECT, replacements: { personId } },
  );
  const first = rows[0];
  if (first === undefined) return null;
  const { printedName, email, state, linkPurpose, linkCreatedAt, linkExpiresAt } = first;
  return {
    personId,
    printedName,
    email,
    state,
    isAdministrator: Boolean(first.isAdministrator),
    createdAt: first.createdAt.toISOString(),
    memberships: rows.flatMap(({ trialCode, trialTitle, role, grantedAt, endedAt, sites }) =>
      trialCode === null || trialTitle === null || role === null || grantedAt === null
        ? []
        : [
            {
              trialCode,
              trialTitle,
              role,
              sites: sites === null ? [] : sites.split(', '),
              grantedAt: grantedAt.toISOString(),
              endedAt: endedAt?.toISOString() ?? null,
            },
          ],
    ),
    link:
      linkPurpose === null || linkCreatedAt === null || linkExpiresAt === null
        ? null
        : {
            purpose: linkPurpose,
            createdAt: linkCreatedAt.toISOString(),
            expiresAt: linkExpiresAt.toISOString(),
          },
    openSessions: first.openSessions,
  };
}
