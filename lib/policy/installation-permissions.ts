import type { Actor } from './roles';

/** What may be done in the installation. All of it is the administrator's, and none of it is clinical. */
export const INSTALLATION_PERMISSIONS = [
  'people.manage',
  'sites.manage',
  'trials.create',
  'memberships.grant',
  'mail.read',
  'installation-trail.read',
] as const;

export type InstallationPermission = (typeof INSTALLATION_PERMISSIONS)[number];

/** True when the actor may do this in the installation. */
export function mayInInstallation(actor: Actor, permission: InstallationPermission): boolean {
  return actor.isAdministrator && INSTALLATION_PERMISSIONS.includes(permission);
}
