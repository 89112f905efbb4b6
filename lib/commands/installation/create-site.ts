import { createSite as decideSite } from '@/lib/conduct/installation/places';
import { models } from '@/lib/db/connection';
import type { InstallationInput } from '@/lib/schemas/installation-inputs';
import { type AdministratorRequest, runAdministratorCommand } from './run-installation-command';

/**
 * Creates a site.
 * @returns its id
 * @throws RefusedError when the code is another site's
 */
export function createSite(
  request: AdministratorRequest,
  input: InstallationInput<'create-site'>,
): Promise<{ siteId: string }> {
  return runAdministratorCommand('create-site', 'sites.manage', request, async (context) => {
    const codeInUse = (await models().Site.findOne({ where: { code: input.code } })) !== null;
    const siteId = context.newId();
    return {
      payloads: decideSite({ codeInUse }, input, siteId, context),
      details: { siteName: input.name },
      result: { siteId },
    };
  });
}
