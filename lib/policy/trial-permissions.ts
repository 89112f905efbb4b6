import type { TrialRole } from './roles';

/**
 * What may be done in a trial, and by which of its roles. Anything not listed is refused. Conditions that
 * depend on a record (own site, own proposal, data once recorded) are added by the conduct core.
 */
export const TRIAL_PERMISSIONS = {
  'trial.read': ['coordinator', 'investigator', 'reviewer', 'statistician', 'sponsor', 'monitor'],
  'trial.halt': ['coordinator', 'investigator', 'reviewer', 'statistician', 'sponsor'],
  'trial.lift': ['reviewer'],
  'design.read': ['reviewer', 'statistician', 'monitor'],
  'design.write': ['statistician'],
  'design.approve': ['reviewer'],
  'cohort.read': ['coordinator', 'investigator', 'reviewer', 'statistician', 'monitor'],
  'subject.read-own-site': ['coordinator', 'investigator'],
  'subject.read-all': ['reviewer', 'statistician', 'monitor'],
  'subject.record': ['coordinator', 'investigator'],
  'recommendation.read': ['reviewer', 'statistician', 'monitor'],
  'recommendation.sign': ['reviewer'],
  'summary.read': ['reviewer', 'statistician', 'sponsor', 'monitor'],
  'team.read': ['coordinator', 'investigator', 'reviewer', 'statistician', 'sponsor', 'monitor'],
  'trail.read': ['reviewer', 'statistician', 'monitor'],
} as const satisfies Readonly<Record<string, readonly TrialRole[]>>;

export type TrialPermission = keyof typeof TRIAL_PERMISSIONS;

/** True when a role of a trial carries the permission. */
export function roleMay(role: TrialRole, permission: TrialPermission): boolean {
  return (TRIAL_PERMISSIONS[permission] as readonly TrialRole[]).includes(role);
}
