import { z } from 'zod';

const id = z.string().min(1).max(36);
const instant = z.iso.datetime({ precision: 3 });
const digest = z.string().regex(/^[0-9a-f]{64}$/);

/** What a single-use link is for. */
export const LINK_PURPOSES = ['first-administrator', 'invitation', 'password-reset'] as const;
export type LinkPurpose = (typeof LINK_PURPOSES)[number];

const event = <Kind extends string, Shape extends z.ZodRawShape>(kind: Kind, shape: Shape) =>
  z.strictObject({ kind: z.literal(kind), ...shape });

/**
 * The payload of every event of the installation's chain: one discriminated union, checked on the way into the trail
 * and on the way out. People are named by their ids alone: no names, no addresses, no tokens of links.
 */
export const installationEventSchema = z.discriminatedUnion('kind', [
  event('person-invited', { personId: id, isAdministrator: z.boolean() }),
  event('link-created', {
    linkDigest: digest,
    purpose: z.enum(LINK_PURPOSES),
    personId: id.nullable(),
    expiresAt: instant,
  }),
  event('links-ended', { purposes: z.array(z.enum(LINK_PURPOSES)).min(1), personId: id.nullable() }),
  event('password-reset-requested', { personId: id }),
  event('person-activated', { personId: id, linkDigest: digest, isAdministrator: z.boolean() }),
  event('password-set', { personId: id, linkDigest: digest }),
  event('password-changed', { personId: id }),
  event('person-disabled', { personId: id }),
  event('person-enabled', { personId: id, state: z.enum(['invited', 'active']) }),
  event('site-created', { siteId: id, code: z.string().max(12), timeZone: z.string().max(64) }),
  event('trial-registered', { trialId: id, code: z.string().max(20) }),
  event('mail-queued-again', { mailId: id }),
]);

export type InstallationEventPayload = z.infer<typeof installationEventSchema>;
export type InstallationEventKind = InstallationEventPayload['kind'];

/** Version of the payload schema stored beside each payload. */
export const INSTALLATION_EVENT_SCHEMA_VERSION = 1;

/**
 * In which capacity somebody acts on the installation: its administrator; a person with the link mailed to them; a
 * person on their own account; a visitor nobody knows (a reset asked for at the sign-in page); the server by itself.
 */
export type InstallationRole = 'administrator' | 'link-holder' | 'account-holder' | 'visitor' | 'system';

/** An event as decided: who, in which capacity, when, what. Its place in the chain is given when it is stored. */
export interface InstallationEvent {
  readonly occurredAt: string;
  /** Null for a visitor and for what the server does by itself. */
  readonly personId: string | null;
  readonly role: InstallationRole;
  readonly payload: InstallationEventPayload;
}
