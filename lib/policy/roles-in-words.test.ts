import { expect, it } from 'vitest';
import type { TrialRole } from './roles';
import { rolesInWords } from './roles-in-words';

const grants = (...roles: TrialRole[]) =>
  roles.map((role, index) => ({ trialId: String(index), role, siteIds: [] }));

it.each([
  [false, grants(), 'No role yet'],
  [true, grants(), 'Administrator'],
  [false, grants('coordinator', 'coordinator'), 'Site coordinator'],
  [true, grants('reviewer', 'statistician'), 'Administrator, Safety reviewer, Statistician'],
])('names each role once', (isAdministrator, memberships, words) => {
  expect(rolesInWords({ isAdministrator, memberships })).toBe(words);
});
