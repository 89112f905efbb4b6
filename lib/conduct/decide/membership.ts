import { ROLE_NAMES, SITE_ROLES } from '@/lib/policy/roles';
import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { type Deciding, refuse } from '../decision';
import { requireAdministrator } from '../permitted';

/** Adds a site to the trial. */
export function addSite(deciding: Deciding, input: TrialInput<'add-site'>): void {
  requireAdministrator(deciding);
  if (deciding.state.sites[input.siteId]) {
    refuse('refused', 'Not added. This site already takes part in the trial.', {
      siteId: 'Already takes part.',
    });
  }
  deciding.emit({ kind: 'site-added', siteId: input.siteId, state: 'active' });
}

/**
 * Grants a role in the trial. Refused where it would break the separation of roles: a second role, a role for the
 * administrator who grants it, a signing role for one who recorded data or proposed a design of this trial.
 */
export function grantMembership(deciding: Deciding, input: TrialInput<'grant-membership'>): void {
  requireAdministrator(deciding);
  const { state, context } = deciding;
  if (input.personId === context.actor.personId) {
    refuse('refused', 'Not granted. An administrator grants nothing to themselves.', {
      personId: 'This is you.',
    });
  }
  const before = state.members[input.personId];
  if (before && before.endedAt === null) {
    refuse(
      'refused',
      `Not granted. This person is ${ROLE_NAMES[before.role].toLowerCase()} of the trial, and a person has one role in a trial. End that role first.`,
      { personId: `Already ${ROLE_NAMES[before.role].toLowerCase()}.` },
    );
  }
  if (input.role === 'reviewer' && before?.hasRecordedData) {
    refuse(
      'refused',
      'Not granted. This person recorded data of this trial, and nobody signs a step of a trial whose data they recorded.',
      { role: 'May not sign in this trial.' },
    );
  }
  const proposed = Object.values(state.designVersions).some(
    (version) => version.proposedBy === input.personId,
  );
  if (input.role === 'reviewer' && proposed) {
    refuse(
      'refused',
      'Not granted. This person proposed a design of this trial, and nobody signs what they proposed.',
      { role: 'May not sign in this trial.' },
    );
  }
  const isSiteRole = SITE_ROLES.includes(input.role);
  if (isSiteRole && input.siteIds.length === 0) {
    refuse('invalid', 'Not granted. This role is for one or more sites; choose them.', {
      siteIds: 'Choose at least one site.',
    });
  }
  if (!isSiteRole && input.siteIds.length > 0) {
    refuse('invalid', 'Not granted. This role is for the whole trial; choose no site.', {
      siteIds: 'Choose no site for this role.',
    });
  }
  if (input.siteIds.some((siteId) => !state.sites[siteId])) {
    refuse('invalid', 'Not granted. A chosen site does not take part in this trial.', {
      siteIds: 'Choose sites of this trial.',
    });
  }
  deciding.emit({
    kind: 'member-granted',
    membershipId: before?.id ?? context.newId(),
    personId: input.personId,
    role: input.role,
    siteIds: [...new Set(input.siteIds)].sort(),
  });
}

/** Ends a role; what the person did stays under their name. */
export function endMembership(deciding: Deciding, input: TrialInput<'end-membership'>): void {
  requireAdministrator(deciding);
  const member = deciding.state.members[input.personId];
  if (!member || member.endedAt !== null) {
    refuse('not-found', 'This person has no role in the trial.');
  }
  deciding.emit({ kind: 'member-ended', personId: input.personId });
}
