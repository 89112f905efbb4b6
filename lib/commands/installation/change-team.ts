import { whyNoTrialRole } from '@/lib/conduct/installation/people';
import { models } from '@/lib/db/connection';
import { notFound, RefusedError } from '@/lib/errors';
import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { runTrialCommand, type TrialCommandResult } from '../run-trial-command';
import { loadPerson, personFacts } from './person-facts';
import type { AdministratorRequest } from './run-installation-command';

type TeamRequest = AdministratorRequest & { readonly trialCode: string };

/** Takes a site into a trial. */
export async function addSiteToTrial(
  request: TeamRequest,
  input: TrialInput<'add-site'>,
): Promise<TrialCommandResult> {
  if ((await models().Site.findByPk(input.siteId)) === null) throw notFound('This site');
  return runTrialCommand({ ...request, command: { type: 'add-site', input } });
}

/**
 * Grants a role in a trial. What breaks the separation of roles is refused by the trial's own rules; besides them an
 * administrator holds no role in any trial, and a disabled account none that is new.
 */
export async function grantMembership(
  request: TeamRequest,
  input: TrialInput<'grant-membership'>,
): Promise<TrialCommandResult> {
  const person = await loadPerson(input.personId);
  const why = person.id === request.personId ? null : whyNoTrialRole(personFacts(person));
  if (why !== null) {
    throw new RefusedError({ code: 'refused', message: `Not granted. ${why}`, fields: { personId: why } });
  }
  return runTrialCommand({ ...request, command: { type: 'grant-membership', input } });
}

/** Ends a person's role in a trial; what they did stays under their name. */
export function endMembership(
  request: TeamRequest,
  input: TrialInput<'end-membership'>,
): Promise<TrialCommandResult> {
  return runTrialCommand({ ...request, command: { type: 'end-membership', input } });
}
