import { type InstallationContext, type InstallationPayloads, refuse } from './decision';
import type { LinkPurpose } from './events';

const HOUR = 3_600_000;

/** How long a link works, in milliseconds, by what it is for. */
export const LINK_LIFE_MILLISECONDS: Readonly<Record<LinkPurpose, number>> = {
  invitation: 7 * 24 * HOUR,
  'password-reset': 24 * HOUR,
  'first-administrator': 24 * HOUR,
};

/** Pause between two reset mails asked for at the sign-in page, so that nobody can flood a mailbox. */
export const RESET_PAUSE_MILLISECONDS = 5 * 60_000;

/** A link as stored: only the digest of its token is known. */
export interface OneTimeLinkFacts {
  readonly digest: string;
  readonly purpose: LinkPurpose;
  readonly personId: string | null;
  readonly expiresAt: string;
  readonly usedAt: string | null;
}

/** A person as decisions about the installation see them. */
export interface PersonFacts {
  readonly personId: string;
  readonly state: 'invited' | 'active' | 'disabled';
  readonly isAdministrator: boolean;
  readonly hasPassword: boolean;
}

/** When a link made now stops working, as ISO 8601 UTC. */
export function linkExpiry(purpose: LinkPurpose, now: string): string {
  return new Date(Date.parse(now) + LINK_LIFE_MILLISECONDS[purpose]).toISOString();
}

/** A new link; older ones of the person for the same purposes end with it. */
export function newLink(
  link: { readonly digest: string; readonly purpose: LinkPurpose; readonly personId: string | null },
  olderStand: boolean,
  context: InstallationContext,
): InstallationPayloads {
  const { digest, purpose, personId } = link;
  return [
    ...(olderStand ? [{ kind: 'links-ended' as const, purposes: [purpose], personId }] : []),
    {
      kind: 'link-created',
      linkDigest: digest,
      purpose,
      personId,
      expiresAt: linkExpiry(purpose, context.now),
    },
  ];
}

const ASK_AGAIN: Readonly<Record<LinkPurpose, string>> = {
  invitation: 'Ask an administrator to send the invitation again.',
  'password-reset': 'Ask for a new one with “Forgotten password” on the sign-in page.',
  'first-administrator': 'Restart Stepwell: it prints a new one while there is no administrator.',
};

/**
 * Why a link does not work, as a refusal, or null when it does. A link that never existed and a mistyped one look
 * alike.
 */
export function whyLinkFails(
  link: OneTimeLinkFacts | null,
  person: PersonFacts | null,
  now: string,
): { readonly code: 'not-found' | 'refused'; readonly message: string } | null {
  if (link === null) {
    return {
      code: 'not-found',
      message: 'This link is not known. Check that the whole address was copied, or ask for a new link.',
    };
  }
  const again = ASK_AGAIN[link.purpose];
  if (link.usedAt !== null) {
    return {
      code: 'refused',
      message: `This link was used already; each works once. If that was you, sign in with the password you chose. ${again}`,
    };
  }
  if (link.expiresAt <= now) {
    return { code: 'refused', message: `This link has expired or was replaced by a newer one. ${again}` };
  }
  if (link.purpose !== 'first-administrator' && (person === null || person.state === 'disabled')) {
    return { code: 'refused', message: 'This account is disabled. Ask an administrator about it.' };
  }
  return null;
}

/**
 * Uses a link: activates an invited person, sets a new password, or creates the first administrator.
 * @param facts.administratorExists refuses a first administrator where there is one
 * @param facts.addressInUse for a first administrator: the address belongs to a person already
 * @param newPersonId the id a first administrator gets
 */
export function acceptLink(
  facts: {
    readonly link: OneTimeLinkFacts | null;
    readonly person: PersonFacts | null;
    readonly administratorExists: boolean;
    readonly addressInUse: boolean;
  },
  newPersonId: string,
  context: InstallationContext,
): InstallationPayloads {
  const { link, person } = facts;
  const failure = whyLinkFails(link, person, context.now);
  if (failure !== null) refuse(failure.code, failure.message);
  if (link === null) throw new Error('A link that works exists.');
  if (link.purpose === 'first-administrator') {
    if (facts.administratorExists) {
      refuse(
        'refused',
        'There is an administrator already. Ask an administrator to invite you; this link makes the first one only.',
      );
    }
    if (facts.addressInUse) {
      refuse('refused', 'Not created. This e-mail address belongs to an account. Enter another one.', {
        email: 'Belongs to an account already.',
      });
    }
    return [
      {
        kind: 'person-activated',
        personId: newPersonId,
        linkDigest: link.digest,
        isAdministrator: true,
      },
    ];
  }
  if (person === null) throw new Error('A link of a person has its person.');
  if (person.state === 'invited') {
    return [
      {
        kind: 'person-activated',
        personId: person.personId,
        linkDigest: link.digest,
        isAdministrator: person.isAdministrator,
      },
    ];
  }
  return [{ kind: 'password-set', personId: person.personId, linkDigest: link.digest }];
}

/**
 * A reset asked for at the sign-in page. Nothing is decided, and nobody is told so, for an unknown address, a
 * disabled account, or one that got such a mail a moment ago.
 * @returns which link to mail: an invited person gets their invitation again; null when none
 */
export function requestedReset(
  person: PersonFacts | null,
  lastLinkCreatedAt: string | null,
  now: string,
): 'invitation' | 'password-reset' | null {
  if (person === null || person.state === 'disabled') return null;
  if (
    lastLinkCreatedAt !== null &&
    Date.parse(now) - Date.parse(lastLinkCreatedAt) < RESET_PAUSE_MILLISECONDS
  ) {
    return null;
  }
  return person.state === 'invited' ? 'invitation' : 'password-reset';
}
