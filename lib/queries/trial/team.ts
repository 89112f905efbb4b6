import { signingObstacle } from '@/lib/conduct/permitted';
import type { TrialSite } from '@/lib/conduct/state';
import { standingMembers } from '@/lib/conduct/trial-facts';
import { ROLE_NAMES, TRIAL_ROLES } from '@/lib/policy/roles';
import { roleMay } from '@/lib/policy/trial-permissions';
import { readerTrial, type TrialReader } from './reader-trial';

/** A member of a trial: name, role, sites. No address. */
export interface TeamMember {
  readonly personId: string;
  readonly printedName: string;
  readonly isReader: boolean;
  readonly roleName: string;
  readonly siteNames: readonly string[];
  readonly memberSince: string;
  readonly isActive: boolean;
}

/** A safety reviewer and whether they may sign; the reason why not goes to those who read the design. */
export interface TeamSigner {
  readonly personId: string;
  readonly printedName: string;
  readonly maySign: boolean;
  readonly whyNot: string | null;
}

export interface TeamSite {
  readonly siteId: string;
  readonly name: string;
  readonly code: string;
  readonly state: TrialSite['state'];
  readonly timeZone: string;
}

export interface TeamView {
  readonly quorum: number;
  readonly members: readonly TeamMember[];
  readonly signers: readonly TeamSigner[];
  readonly sites: readonly TeamSite[];
}

const WHY_NOT = {
  'no-reviewer': 'is no safety reviewer of this trial',
  'recorded-data': 'recorded data of this trial',
  'proposed-design': 'proposed a design version of this trial',
} as const;

/** Who takes part in a trial, at which sites, and who may sign its steps; null when the trial is not the reader's. */
export async function team(reader: TrialReader, code: string): Promise<TeamView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('team.read')) return null;
  const { state, people, sites } = trial.loaded;
  const nameOf = (personId: string) => people[personId]?.printedName ?? '';
  const members = standingMembers(state).sort(
    (a, b) =>
      TRIAL_ROLES.indexOf(a.role) - TRIAL_ROLES.indexOf(b.role) ||
      nameOf(a.personId).localeCompare(nameOf(b.personId)),
  );
  return {
    quorum: state.trial.quorum,
    members: members.map((member) => ({
      personId: member.personId,
      printedName: nameOf(member.personId),
      isReader: member.personId === reader.personId,
      roleName: ROLE_NAMES[member.role],
      siteNames: member.siteIds.map((siteId) => sites[siteId]?.name ?? '').sort(),
      memberSince: member.grantedAt,
      isActive: people[member.personId]?.isActive ?? false,
    })),
    signers: members
      .filter((member) => roleMay(member.role, 'recommendation.sign'))
      .map(({ personId }) => {
        const obstacle = signingObstacle(state, personId);
        return {
          personId,
          printedName: nameOf(personId),
          maySign: obstacle === null,
          whyNot: obstacle !== null && trial.may('design.read') ? WHY_NOT[obstacle] : null,
        };
      }),
    sites: Object.values(state.sites)
      .map(({ siteId, state: siteState }) => ({
        siteId,
        name: sites[siteId]?.name ?? '',
        code: sites[siteId]?.code ?? '',
        state: siteState,
        timeZone: sites[siteId]?.timeZone ?? 'UTC',
      }))
      .sort((a, b) => a.name.localeCompare(b.name)),
  };
}
