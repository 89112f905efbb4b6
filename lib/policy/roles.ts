/** The roles a person may have in a trial; one a person and trial. The administrator's is of the installation. */
export const TRIAL_ROLES = [
  'coordinator',
  'investigator',
  'reviewer',
  'statistician',
  'sponsor',
  'monitor',
] as const;
export type TrialRole = (typeof TRIAL_ROLES)[number];

/** The name of each role on pages and in mails. */
export const ROLE_NAMES: Readonly<Record<TrialRole | 'administrator', string>> = {
  coordinator: 'Site coordinator',
  investigator: 'Investigator',
  reviewer: 'Safety reviewer',
  statistician: 'Statistician',
  sponsor: 'Sponsor',
  monitor: 'Monitor',
  administrator: 'Administrator',
};

/** Roles that act for one or more sites of a trial, and for those alone. */
export const SITE_ROLES: readonly TrialRole[] = ['coordinator', 'investigator'];

/** A role in one trial, with the sites it is for (site roles only). */
export interface MembershipGrant {
  readonly trialId: string;
  readonly role: TrialRole;
  readonly siteIds: readonly string[];
}

/** The person behind a request, as read from the database at that request. */
export interface Actor {
  readonly personId: string;
  readonly printedName: string;
  readonly isAdministrator: boolean;
  readonly memberships: readonly MembershipGrant[];
}

/** The actor's standing membership in a trial, or null. */
export function membershipIn(actor: Actor, trialId: string): MembershipGrant | null {
  return actor.memberships.find((membership) => membership.trialId === trialId) ?? null;
}
