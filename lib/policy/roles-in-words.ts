import { type Actor, ROLE_NAMES } from './roles';

/** The roles of a person, each named once: "Administrator", "Safety reviewer, Statistician"; "No role yet". */
export function rolesInWords(actor: Pick<Actor, 'isAdministrator' | 'memberships'>): string {
  const names = new Set<string>(actor.isAdministrator ? [ROLE_NAMES.administrator] : []);
  for (const { role } of actor.memberships) names.add(ROLE_NAMES[role]);
  return names.size === 0 ? 'No role yet' : [...names].join(', ');
}
