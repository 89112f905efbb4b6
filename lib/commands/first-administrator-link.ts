import { newLink } from '@/lib/conduct/installation/links';
import { models } from '@/lib/db/connection';
import { linkPath } from '@/lib/schemas/one-time-link';
import { newLinkToken } from './installation/person-facts';
import { runPublicCommand } from './installation/run-installation-command';

/**
 * Makes the single-use link with which the first administrator creates their account; links made before stop working.
 * @param baseUrl the address under which people reach the installation, without a slash at its end
 * @param clock the clock, for building demonstrations with earlier times; the server's otherwise
 * @returns the link, which works for 24 hours, or null when there is an active administrator
 */
export async function makeFirstAdministratorLink(
  baseUrl: string,
  clock?: () => number,
): Promise<string | null> {
  const { token } = await runPublicCommand<{ token: string | null }>(
    'system',
    async (context) => {
      const administrators = await models().Person.count({
        where: { isAdministrator: true, state: 'active' },
      });
      if (administrators > 0) return { payloads: [], result: { token: null } };
      const link = newLinkToken();
      return {
        payloads: newLink(
          { digest: link.digest, purpose: 'first-administrator', personId: null },
          true,
          context,
        ),
        result: { token: link.token },
      };
    },
    { clock, repeatable: false },
  );
  return token === null ? null : `${baseUrl}${linkPath('first-administrator', token)}`;
}
