import { whyLinkFails } from '@/lib/conduct/installation/links';
import { models } from '@/lib/db/connection';
import { sha256 } from '@/lib/hash';
import { linkTokenSchema } from '@/lib/schemas/installation-inputs';

/** A link as its page shows it: whose it is and until when it works, or why it does not. */
export type LinkPage =
  | { readonly works: false; readonly message: string }
  | {
      readonly works: true;
      readonly expiresAt: string;
      /** Null for the first administrator, whom nobody knows yet. */
      readonly person: { readonly email: string; readonly printedName: string } | null;
    };

/**
 * Looks at a single-use link without using it.
 * @param purpose the page's; a link for something else is not known there
 * @param now the server's clock, in milliseconds since 1970
 */
export async function linkPage(
  purpose: 'first-administrator' | 'invitation' | 'password-reset',
  token: string,
  now: number,
): Promise<LinkPage> {
  const { Installation, OneTimeLink, Person } = models();
  const found = linkTokenSchema.safeParse(token).success
    ? await OneTimeLink.findOne({ where: { tokenDigest: sha256(token), purpose } })
    : null;
  const person = found?.personId ? await Person.findByPk(found.personId) : null;
  const installation = await Installation.findByPk(1, { rejectOnEmpty: true });
  const failure = whyLinkFails(
    found && {
      digest: found.tokenDigest,
      purpose: found.purpose,
      personId: found.personId,
      expiresAt: found.expiresAt.toISOString(),
      usedAt: found.usedAt?.toISOString() ?? null,
    },
    person && {
      personId: person.id,
      state: person.state,
      isAdministrator: person.isAdministrator,
      hasPassword: person.passwordHash !== null,
    },
    new Date(now + Number(installation.clockOffsetMilliseconds)).toISOString(),
  );
  if (failure !== null || found === null) return { works: false, message: failure?.message ?? '' };
  return {
    works: true,
    expiresAt: found.expiresAt.toISOString(),
    person: person && { email: person.email, printedName: person.printedName },
  };
}
