import type { TrialCommand } from '@/lib/conduct/decision';
import { whyNoTrialRole } from '@/lib/conduct/installation/people';
import { models } from '@/lib/db/connection';
import { notFound, RefusedError } from '@/lib/errors';
import { loadPerson, personFacts } from './installation/person-facts';

/**
 * What the trial's own rules cannot know of a change of its team: that the site and the person exist, that the person
 * is no administrator, who holds no role in any trial, and that their account is not disabled. Asked in the command's
 * transaction.
 * @param administratorId who grants; that they grant nothing to themselves is the trial's own rule
 * @throws RefusedError with the field concerned
 */
export async function checkTeamChange(command: TrialCommand, administratorId: string): Promise<void> {
  if (command.type === 'add-site') {
    if ((await models().Site.findByPk(command.input.siteId)) === null) throw notFound('This site');
    return;
  }
  if (command.type !== 'grant-membership' || command.input.personId === administratorId) return;
  const why = whyNoTrialRole(personFacts(await loadPerson(command.input.personId)));
  if (why !== null) {
    throw new RefusedError({ code: 'refused', message: `Not granted. ${why}`, fields: { personId: why } });
  }
}
