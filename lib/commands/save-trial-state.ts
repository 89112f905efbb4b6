import { canonicalize } from 'json-canonicalize';
import type { Model, ModelStatic } from 'sequelize';
import type { DesignVersion, Member, TrialState } from '@/lib/conduct/state';
import { models } from '@/lib/db/connection';

type Entity = { readonly id: string };
type Entities = Readonly<Record<string, object>>;
type Row = Record<string, unknown>;

/** The attributes that differ between two rows of the same id. */
function changedAttributes(before: Row, after: Row): Row {
  const changed: Row = {};
  for (const [attribute, value] of Object.entries(after)) {
    if (before[attribute] !== value) changed[attribute] = value;
  }
  return changed;
}

/**
 * Writes one collection: rows that changed first (they may free a unique key: the awaiting recommendation, the open
 * cohort, a standing signature), then new rows.
 */
async function saveCollection(
  model: ModelStatic<Model>,
  before: Entities,
  after: Entities,
  toRow: (entity: object) => Row,
): Promise<void> {
  if (before === after) return;
  const inserts: Row[] = [];
  for (const [key, entity] of Object.entries(after)) {
    const previous = before[key];
    if (previous === entity) continue;
    const row = toRow(entity);
    if (previous === undefined) {
      inserts.push(row);
      continue;
    }
    const changed = changedAttributes(toRow(previous), row);
    if (Object.keys(changed).length > 0) {
      await model.update(changed, { where: { id: (entity as Entity).id } });
    }
  }
  if (inserts.length > 0) await model.bulkCreate(inserts);
}

async function saveMembers(trialId: string, before: TrialState, after: TrialState): Promise<void> {
  const { Membership, MembershipSite } = models();
  await saveCollection(Membership, before.members, after.members, (entity) => {
    const { siteIds: _siteIds, ...row } = entity as Member;
    return { ...row, trialId };
  });
  for (const member of Object.values(after.members)) {
    const previous = before.members[member.personId]?.siteIds ?? [];
    if (previous === member.siteIds) continue;
    const added = member.siteIds.filter((siteId) => !previous.includes(siteId));
    const removed = previous.filter((siteId) => !member.siteIds.includes(siteId));
    if (removed.length > 0) {
      await MembershipSite.destroy({ where: { membershipId: member.id, siteId: removed } });
    }
    if (added.length > 0) {
      await MembershipSite.bulkCreate(added.map((siteId) => ({ membershipId: member.id, siteId })));
    }
  }
}

async function saveSites(trialId: string, before: TrialState, after: TrialState): Promise<void> {
  const { TrialSite } = models();
  for (const site of Object.values(after.sites)) {
    const previous = before.sites[site.siteId];
    if (previous === site) continue;
    if (previous === undefined) await TrialSite.create({ ...site, trialId });
    else await TrialSite.update({ state: site.state }, { where: { trialId, siteId: site.siteId } });
  }
}

/**
 * Writes what differs between two states of a trial, in the order the foreign keys ask for. The rows are exactly what
 * `evolve` made: the tables cannot say anything else than the trail. Runs in the caller's transaction; the trial's own
 * row is written with the chain's head (lib/commands/append-to-chain.ts).
 */
export async function saveTrialState(before: TrialState, after: TrialState): Promise<void> {
  const m = models();
  const trialId = after.trial.id;
  const ofTrial = (entity: object): Row => ({ ...entity, trialId });
  await saveSites(trialId, before, after);
  await saveMembers(trialId, before, after);
  await saveCollection(m.DesignVersion, before.designVersions, after.designVersions, (entity) => {
    const version = entity as DesignVersion;
    return { ...version, design: canonicalize(version.design), trialId };
  });
  await saveCollection(m.Recommendation, before.recommendations, after.recommendations, ofTrial);
  await saveCollection(m.Release, before.releases, after.releases, ofTrial);
  await saveCollection(m.Cohort, before.cohorts, after.cohorts, ofTrial);
  await saveCollection(m.Subject, before.subjects, after.subjects, ofTrial);
  await saveCollection(m.Halt, before.halts, after.halts, ofTrial);
  await saveCollection(m.Signature, before.signatures, after.signatures, ofTrial);
}
