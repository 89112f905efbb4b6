import { QueryTypes } from 'sequelize';
import type {
  Cohort,
  DesignVersion,
  Halt,
  Member,
  RecommendationRow,
  Release,
  Signature,
  Subject,
  TrialFacts,
  TrialSite,
  TrialState,
} from '@/lib/conduct/state';
import { database } from '@/lib/db/connection';
import { designSchema } from '@/lib/schemas/design';
import { columnsOf, entityOf, type RawRow } from './rows';

/** A person of the trial, as pages and mails name them. */
export interface DirectoryEntry {
  readonly personId: string;
  readonly printedName: string;
  readonly email: string;
  readonly isActive: boolean;
}

/** A site of the trial, as pages and mails name it. */
export interface SiteEntry {
  readonly siteId: string;
  readonly code: string;
  readonly name: string;
  readonly timeZone: string;
}

/** A trial's state with the names that belong to its ids. */
export interface LoadedTrial {
  readonly state: TrialState;
  readonly people: Readonly<Record<string, DirectoryEntry>>;
  readonly sites: Readonly<Record<string, SiteEntry>>;
  /** Counts every command of the trial; a page says with it what it was drawn from. */
  readonly version: number;
}

export interface LoadOptions {
  /** Also the stored texts of every recommendation and signature, not only of the awaiting recommendation. */
  readonly withTexts?: boolean;
}

function byId<T extends { id: string }>(entities: Iterable<T | null>): Record<string, T> {
  const found: Record<string, T> = {};
  for (const entity of entities) if (entity !== null) found[entity.id] = entity;
  return found;
}

/** Names a trial by its id, or by the code of its address. */
export type TrialName = { readonly id: string } | { readonly code: string };

/**
 * Loads the state of a trial in four statements, whatever the number of cohorts and subjects, or null when there is
 * no such trial.
 */
export async function findTrial(name: TrialName, options: LoadOptions = {}): Promise<LoadedTrial | null> {
  const { sequelize, models } = database();
  const select = (sql: string): Promise<RawRow[]> =>
    sequelize.query(sql, { type: QueryTypes.SELECT, replacements: { ...name } });
  const trialId = 'id' in name ? ':id' : '(SELECT id FROM trials WHERE code = :code)';
  const m = models;

  const textColumns = options.withTexts
    ? 'r.record AS r__record, g.signed_text AS g__signedText'
    : `CASE WHEN r.state = 'awaiting' THEN r.record ELSE '' END AS r__record, '' AS g__signedText`;

  const trialRows = await select(`
    SELECT ${columnsOf(m.Trial, 't')}, ${columnsOf(m.DesignVersion, 'v')}, ${columnsOf(m.Halt, 'h')}
    FROM trials t
    LEFT JOIN design_versions v ON v.trial_id = t.id
    LEFT JOIN halts h ON h.trial_id = t.id
    WHERE t.id = ${trialId}`);
  const memberColumns = `${columnsOf(m.Membership, 'm')}, p.printed_name, p.email, p.state AS person_state,
    k.site_id AS member_site_id, ${columnsOf(m.TrialSite, 'x')}, s.code AS site_code, s.name AS site_name,
    s.time_zone`;
  const memberAndSiteRows = await select(`
    SELECT ${memberColumns}
    FROM memberships m
    JOIN people p ON p.id = m.person_id
    LEFT JOIN membership_sites k ON k.membership_id = m.id
    LEFT JOIN trial_sites x ON FALSE
    LEFT JOIN sites s ON FALSE
    WHERE m.trial_id = ${trialId}
    UNION ALL
    SELECT ${memberColumns}
    FROM trial_sites x
    JOIN sites s ON s.id = x.site_id
    LEFT JOIN memberships m ON FALSE
    LEFT JOIN people p ON FALSE
    LEFT JOIN membership_sites k ON FALSE
    WHERE x.trial_id = ${trialId}`);
  const cohortRows = await select(`
    SELECT ${columnsOf(m.Cohort, 'c')}, ${columnsOf(m.Release, 'e')}, ${columnsOf(m.Subject, 's')}
    FROM cohorts c
    JOIN releases e ON e.id = c.release_id
    LEFT JOIN subjects s ON s.cohort_id = c.id
    WHERE c.trial_id = ${trialId}`);
  const recommendationRows = await select(`
    SELECT ${columnsOf(m.Recommendation, 'r', ['record'])}, ${columnsOf(m.Signature, 'g', ['signedText'])}, ${textColumns}
    FROM signatures g
    LEFT JOIN recommendations r ON r.id = g.recommendation_id
    WHERE g.trial_id = ${trialId}
    UNION ALL
    SELECT ${columnsOf(m.Recommendation, 'r', ['record'])}, ${columnsOf(m.Signature, 'g', ['signedText'])}, ${textColumns}
    FROM recommendations r
    LEFT JOIN signatures g ON FALSE
    WHERE r.trial_id = ${trialId}`);

  const first = trialRows[0];
  if (first === undefined) return null;
  const trial = entityOf<
    TrialFacts & { version: number; chainSequence: number; chainHead: string; chainTime: string }
  >(m.Trial, 't', first);
  if (trial === null) return null;
  const { version, chainSequence: _sequence, chainHead: _head, chainTime: _time, ...facts } = trial;

  const members: Record<string, Member> = {};
  const people: Record<string, DirectoryEntry> = {};
  const trialSites: Record<string, TrialSite> = {};
  const sites: Record<string, SiteEntry> = {};
  for (const row of memberAndSiteRows) {
    const member = entityOf<Member & { trialId: string }>(m.Membership, 'm', row);
    if (member !== null) {
      const { trialId: _trialId, ...rest } = member;
      const siteIds = members[member.personId]?.siteIds ?? [];
      members[member.personId] = {
        ...rest,
        siteIds: row.member_site_id ? [...siteIds, String(row.member_site_id)].sort() : siteIds,
      };
      people[member.personId] = {
        personId: member.personId,
        printedName: String(row.printed_name),
        email: String(row.email),
        isActive: row.person_state === 'active',
      };
    }
    const site = entityOf<TrialSite & { trialId: string }>(m.TrialSite, 'x', row, 'siteId');
    if (site !== null) {
      trialSites[site.siteId] = { siteId: site.siteId, state: site.state };
      sites[site.siteId] = {
        siteId: site.siteId,
        code: String(row.site_code),
        name: String(row.site_name),
        timeZone: String(row.time_zone),
      };
    }
  }

  // A joined row repeats what it is joined to: each entity is made once.
  const entities = <T extends { id: string }>(
    model: Parameters<typeof entityOf>[0],
    alias: string,
    rows: readonly RawRow[],
  ): Record<string, T> => {
    const found: Record<string, T> = {};
    for (const row of rows) {
      const id = row[`${alias}__id`];
      if (typeof id === 'string' && id in found) continue;
      const entity = entityOf<T & { trialId?: string }>(model, alias, row);
      if (entity === null) continue;
      const { trialId: _trialId, ...rest } = entity;
      found[entity.id] = rest as unknown as T;
    }
    return found;
  };

  const storedVersions = entities<Omit<DesignVersion, 'design'> & { design: string }>(
    m.DesignVersion,
    'v',
    trialRows,
  );
  const designVersions = byId(
    Object.values(storedVersions).map((stored) => ({
      ...stored,
      design: designSchema.parse(JSON.parse(stored.design)),
    })),
  );

  return {
    state: {
      trial: facts,
      sites: trialSites,
      members,
      designVersions,
      recommendations: entities<RecommendationRow>(m.Recommendation, 'r', recommendationRows),
      releases: entities<Release>(m.Release, 'e', cohortRows),
      cohorts: entities<Cohort>(m.Cohort, 'c', cohortRows),
      subjects: entities<Subject>(m.Subject, 's', cohortRows),
      halts: entities<Halt>(m.Halt, 'h', trialRows),
      signatures: entities<Signature>(m.Signature, 'g', recommendationRows),
    },
    people,
    sites,
    version,
  };
}

/** The state of a trial that exists; throws when there is none. */
export async function loadTrialState(trialId: string, options: LoadOptions = {}): Promise<LoadedTrial> {
  const loaded = await findTrial({ id: trialId }, options);
  if (loaded === null) throw new Error(`There is no trial ${trialId}.`);
  return loaded;
}
