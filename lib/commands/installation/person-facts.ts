import { newToken, tokenDigest } from '@/lib/auth/tokens';
import type { OneTimeLinkFacts, PersonFacts } from '@/lib/conduct/installation/links';
import { models } from '@/lib/db/connection';
import { notFound } from '@/lib/errors';
import type { OneTimeLink } from '@/models/one-time-link';
import type { Person } from '@/models/person';

/** A person's row as decisions see it. */
export function personFacts(person: Person): PersonFacts {
  return {
    personId: person.id,
    state: person.state,
    isAdministrator: person.isAdministrator,
    hasPassword: person.passwordHash !== null,
  };
}

/** A link's row as decisions see it. */
export function linkFacts(link: OneTimeLink): OneTimeLinkFacts {
  return {
    digest: link.tokenDigest,
    purpose: link.purpose,
    personId: link.personId,
    expiresAt: link.expiresAt.toISOString(),
    usedAt: link.usedAt?.toISOString() ?? null,
  };
}

/** The person of an id; refused like one that does not exist when there is none. */
export async function loadPerson(personId: string): Promise<Person> {
  const person = await models().Person.findByPk(personId);
  if (person === null) throw notFound('This person');
  return person;
}

/** A new link's token, which only its mail holds, and the digest that is stored. */
export function newLinkToken(): { readonly token: string; readonly digest: string } {
  const token = newToken();
  return { token, digest: tokenDigest(token) };
}
