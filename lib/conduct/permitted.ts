import { ROLE_NAMES } from '@/lib/policy/roles';
import { roleMay, type TrialPermission } from '@/lib/policy/trial-permissions';
import { type Deciding, refuse } from './decision';
import type { Member, TrialState } from './state';
import { standingMember } from './trial-facts';

/** The actor's standing membership; refuses when there is none or its role lacks the permission. */
export function requirePermission(deciding: Deciding, permission: TrialPermission): Member {
  const { actor } = deciding.context;
  const member = actor.personId === null ? null : standingMember(deciding.state, actor.personId);
  if (member === null) refuse('not-found', 'This trial does not exist, or you have no access to it.');
  if (!roleMay(member.role, permission)) {
    refuse(
      'forbidden',
      `This is not for the role of ${ROLE_NAMES[member.role].toLowerCase()} in this trial.`,
    );
  }
  return member;
}

/** Refuses any actor but the administrator. */
export function requireAdministrator(deciding: Deciding): void {
  if (deciding.context.actor.role !== 'administrator') {
    refuse('forbidden', 'Only an administrator may do this.');
  }
}

/** What keeps a person from signing steps of a trial. */
export type SigningObstacle = 'no-reviewer' | 'recorded-data' | 'proposed-design';

/**
 * What keeps a person from signing a step of this trial, or null when nothing does. A signer is a standing safety
 * reviewer who never recorded data of the trial and proposed no version in force or in review.
 */
export function signingObstacle(state: TrialState, personId: string): SigningObstacle | null {
  const member = standingMember(state, personId);
  if (member === null || !roleMay(member.role, 'recommendation.sign')) return 'no-reviewer';
  if (member.hasRecordedData) return 'recorded-data';
  const proposed = Object.values(state.designVersions).some(
    (version) => version.state !== 'draft' && version.proposedBy === personId,
  );
  return proposed ? 'proposed-design' : null;
}

const OBSTACLE_TO_SIGNER: Readonly<Record<SigningObstacle, string>> = {
  'no-reviewer': 'Only a safety reviewer of this trial may sign.',
  'recorded-data': 'You recorded data of this trial, so you may sign none of its steps.',
  'proposed-design': 'You proposed a design version of this trial, so you may sign none of its steps.',
};

/** Why a person may not sign a step of this trial, as a sentence said to them; null when they may. */
export function whyMayNotSign(state: TrialState, personId: string): string | null {
  const obstacle = signingObstacle(state, personId);
  return obstacle && OBSTACLE_TO_SIGNER[obstacle];
}

/** The people who may sign steps of the trial as it stands. */
export function eligibleSigners(state: TrialState): string[] {
  return Object.keys(state.members).filter((personId) => whyMayNotSign(state, personId) === null);
}
