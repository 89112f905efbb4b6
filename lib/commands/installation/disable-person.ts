import { Op } from 'sequelize';
import * as people from '@/lib/conduct/installation/people';
import { models } from '@/lib/db/connection';
import type { InstallationInput } from '@/lib/schemas/installation-inputs';
import { loadPerson, personFacts } from './person-facts';
import { type AdministratorRequest, runAdministratorCommand } from './run-installation-command';

/** Disables an account; its sessions and links end in the same transaction. */
export function disablePerson(
  request: AdministratorRequest,
  input: InstallationInput<'disable-person'>,
): Promise<{ personId: string }> {
  return runAdministratorCommand('disable-person', 'people.manage', request, async (context) => {
    const person = await loadPerson(input.personId);
    const others = await models().Person.count({
      where: { isAdministrator: true, state: 'active', id: { [Op.ne]: person.id } },
    });
    return {
      payloads: people.disablePerson(personFacts(person), others, context),
      result: { personId: person.id },
    };
  });
}

/** Enables a disabled account again; nobody is signed in by it. */
export function enablePerson(
  request: AdministratorRequest,
  input: InstallationInput<'enable-person'>,
): Promise<{ personId: string }> {
  return runAdministratorCommand('enable-person', 'people.manage', request, async (context) => {
    const person = await loadPerson(input.personId);
    return {
      payloads: people.enablePerson(personFacts(person), context),
      result: { personId: person.id },
    };
  });
}
