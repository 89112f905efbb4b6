import { Op } from 'sequelize';
import type { InstallationEventPayload } from '@/lib/conduct/installation/events';
import { models } from '@/lib/db/connection';
import { endSessionsOf } from '../end-session';

/** What rows hold and events must not. */
export interface EventDetails {
  readonly person?: { readonly email: string; readonly printedName: string };
  /** A corrected printed name of an invited person. */
  readonly printedName?: string | undefined;
  readonly passwordHash?: string;
  readonly siteName?: string;
  /** The session that stands when a person changes their own password: the one they do it in. */
  readonly standingSessionId?: string;
}

function needed<T>(value: T | undefined, what: string): T {
  if (value === undefined) throw new Error(`An event came without its ${what}.`);
  return value;
}

/** Links that stand stop working now, and a mail that still waits with one is not sent. */
async function endLinks(
  { purposes, personId }: Extract<InstallationEventPayload, { kind: 'links-ended' }>,
  at: Date,
): Promise<void> {
  const { OneTimeLink, OutboxMail } = models();
  await OneTimeLink.update(
    { expiresAt: at },
    { where: { purpose: purposes, personId, usedAt: null, expiresAt: { [Op.gt]: at } } },
  );
  if (personId === null) return;
  await OutboxMail.update(
    { state: 'overtaken', payload: '{}', leaseOwner: null, leaseUntil: null },
    { where: { personId, kind: purposes, state: 'queued' } },
  );
}

async function activate(
  payload: Extract<InstallationEventPayload, { kind: 'person-activated' }>,
  details: EventDetails,
  at: Date,
): Promise<void> {
  const { Person } = models();
  const passwordHash = needed(details.passwordHash, 'password hash');
  if (details.person !== undefined) {
    await Person.create({
      id: payload.personId,
      ...details.person,
      passwordHash,
      state: 'active',
      isAdministrator: payload.isAdministrator,
      createdAt: at,
    });
    return;
  }
  const { printedName } = details;
  await Person.update(
    { passwordHash, state: 'active', ...(printedName === undefined ? {} : { printedName }) },
    { where: { id: payload.personId } },
  );
}

async function saveEvent(payload: InstallationEventPayload, details: EventDetails, at: Date): Promise<void> {
  const { OneTimeLink, OutboxMail, Person, Site } = models();
  switch (payload.kind) {
    case 'person-invited':
      await Person.create({
        id: payload.personId,
        ...needed(details.person, 'name and address'),
        passwordHash: null,
        state: 'invited',
        isAdministrator: payload.isAdministrator,
        createdAt: at,
      });
      return;
    case 'link-created':
      await OneTimeLink.create({
        tokenDigest: payload.linkDigest,
        purpose: payload.purpose,
        personId: payload.personId,
        createdAt: at,
        expiresAt: new Date(payload.expiresAt),
        usedAt: null,
      });
      return;
    case 'links-ended':
      return endLinks(payload, at);
    case 'person-activated':
      await OneTimeLink.update({ usedAt: at }, { where: { tokenDigest: payload.linkDigest } });
      return activate(payload, details, at);
    case 'password-set':
      await OneTimeLink.update({ usedAt: at }, { where: { tokenDigest: payload.linkDigest } });
      await Person.update(
        { passwordHash: needed(details.passwordHash, 'password hash') },
        { where: { id: payload.personId } },
      );
      return endSessionsOf(payload.personId, at);
    case 'password-changed':
      await Person.update(
        { passwordHash: needed(details.passwordHash, 'password hash') },
        { where: { id: payload.personId } },
      );
      return endSessionsOf(payload.personId, at, details.standingSessionId);
    case 'person-disabled':
      await Person.update({ state: 'disabled' }, { where: { id: payload.personId } });
      return endSessionsOf(payload.personId, at);
    case 'person-enabled':
      await Person.update({ state: payload.state }, { where: { id: payload.personId } });
      return;
    case 'site-created':
      await Site.create({
        id: payload.siteId,
        code: payload.code,
        name: needed(details.siteName, 'name of the site'),
        timeZone: payload.timeZone,
        createdAt: at,
      });
      return;
    case 'mail-queued-again':
      await OutboxMail.update(
        { state: 'queued', attempts: 0, nextAttemptAt: null, leaseOwner: null, leaseUntil: null },
        { where: { id: payload.mailId } },
      );
      return;
    case 'password-reset-requested':
      return;
    case 'trial-registered':
      // The trial's own rows are written with its own chain (create-trial.ts).
      return;
  }
}

/** Writes the rows that events of the installation stand for, in their order, in the caller's transaction. */
export async function saveInstallationEvents(
  payloads: readonly InstallationEventPayload[],
  details: EventDetails,
  now: string,
): Promise<void> {
  for (const payload of payloads) await saveEvent(payload, details, new Date(now));
}
