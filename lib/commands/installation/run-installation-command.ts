import { QueryTypes } from 'sequelize';
import { INSTALLATION_CHAIN } from '@/lib/conduct/chain';
import type { InstallationContext, InstallationPayloads } from '@/lib/conduct/installation/decision';
import {
  INSTALLATION_EVENT_SCHEMA_VERSION,
  installationEventSchema,
  type InstallationRole,
} from '@/lib/conduct/installation/events';
import { models, sequelize } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { notFound } from '@/lib/errors';
import { newId } from '@/lib/hash';
import { type InstallationPermission, mayInInstallation } from '@/lib/policy/installation-permissions';
import { appendToChain } from '../append-to-chain';
import { commandTime } from '../command-time';
import { type QueuedMail, queueMails } from '../queue-mails';
import { storeSubmission, submissionResult } from '../submissions';
import { type EventDetails, saveInstallationEvents } from './save-installation-events';

/** Who asks for an act of administration, and under which key their form was sent. */
export interface AdministratorRequest {
  readonly personId: string;
  /** Made once by the form; the same key posted again changes nothing and gets the same answer. */
  readonly submissionKey: string;
  /** The clock, for building demonstrations with earlier times; the server's otherwise. */
  readonly clock?: () => number;
}

/** What a command on the installation came to: what is kept, mailed and answered. */
export interface InstallationWork<Result extends object> {
  readonly payloads: InstallationPayloads;
  /** What rows hold and events must not: names, addresses, password hashes. */
  readonly details?: EventDetails;
  readonly mails?: readonly QueuedMail[];
  readonly result: Result;
  /** Who acted, where that is known only once the link was read. */
  readonly actor?: { readonly personId: string; readonly role: InstallationRole };
  /** What is written last, once the rows of the events stand. */
  readonly afterwards?: () => Promise<void>;
}

interface LockedInstallation {
  version: number;
  chainSequence: number;
  chainHead: string;
  chainTime: Date | null;
  clockOffset: number;
}

/** The first statement of every command: the installation's row, locked until the commit. */
async function lockInstallation(): Promise<LockedInstallation> {
  const rows = await sequelize().query<LockedInstallation>(
    `SELECT version, chain_sequence AS chainSequence, chain_head AS chainHead, chain_time AS chainTime,
       clock_offset_milliseconds AS clockOffset
     FROM installation WHERE id = 1 FOR UPDATE`,
    { type: QueryTypes.SELECT },
  );
  const installation = rows[0];
  if (!installation) throw new Error('The database has no installation row; it was not migrated to its end.');
  return installation;
}

async function keep<Result extends object>(
  locked: LockedInstallation,
  work: InstallationWork<Result>,
  context: InstallationContext,
): Promise<void> {
  if (work.payloads.length === 0) return;
  const { now } = context;
  const actor = work.actor ?? context.actor;
  const payloads = work.payloads.map((payload) => installationEventSchema.parse(payload));
  await saveInstallationEvents(payloads, work.details ?? {}, now);
  const { head } = await appendToChain(
    INSTALLATION_CHAIN,
    { sequence: locked.chainSequence, hash: locked.chainHead },
    payloads.map((payload) => ({ ...actor, occurredAt: now, kind: payload.kind, payload })),
    INSTALLATION_EVENT_SCHEMA_VERSION,
  );
  await models().Installation.update(
    {
      version: locked.version + 1,
      chainSequence: head.sequence,
      chainHead: head.hash,
      chainTime: new Date(now),
    },
    { where: { id: 1 } },
  );
  await queueMails(work.mails ?? [], now);
  await work.afterwards?.();
}

/**
 * Runs an administrator's act on the installation, in one transaction: lock the installation's row, answer a repeated
 * submission with its first result, read the person again and ask the policy, decide, save rows with trail and outbox,
 * store the submission. Run again as a whole after a deadlock or a conflict at commit.
 * @param command its name, as kept with the submission
 * @param work loads what the decision needs and decides; it throws a RefusedError, and nothing is recorded then
 * @throws RefusedError "not-found" for everyone who is no active administrator
 */
export function runAdministratorCommand<Result extends object>(
  command: string,
  permission: InstallationPermission,
  request: AdministratorRequest,
  work: (context: InstallationContext) => Promise<InstallationWork<Result>>,
): Promise<Result> {
  const { personId, submissionKey } = request;
  return inTransaction(
    async () => {
      const locked = await lockInstallation();
      const person = await models().Person.findByPk(personId);
      const isAllowed =
        person?.state === 'active' &&
        mayInInstallation({ ...person.get(), personId, memberships: [] }, permission);
      if (!isAllowed) throw notFound('This page');
      const earlier = await submissionResult(personId, submissionKey, command);
      if (earlier !== null) return earlier as Result;
      const now = commandTime((request.clock ?? Date.now)(), locked.clockOffset, locked.chainTime);
      const context: InstallationContext = { now, newId, actor: { personId, role: 'administrator' } };
      const done = await work(context);
      await keep(locked, done, context);
      await storeSubmission(personId, submissionKey, command, done.result, now);
      return done.result;
    },
    { repeatable: true },
  );
}

/**
 * Runs an act on the installation that nobody is signed in for (a link is used, a reset is asked for) or that the
 * server does by itself, in the same order, without a submission of its own.
 * @param repeatable true when the work recognises its own earlier success
 */
export function runPublicCommand<Result extends object>(
  role: Exclude<InstallationRole, 'administrator'>,
  work: (context: InstallationContext) => Promise<InstallationWork<Result>>,
  options: { readonly clock?: (() => number) | undefined; readonly repeatable: boolean },
): Promise<Result> {
  return inTransaction(
    async () => {
      const locked = await lockInstallation();
      const now = commandTime((options.clock ?? Date.now)(), locked.clockOffset, locked.chainTime);
      const context: InstallationContext = { now, newId, actor: { personId: null, role } };
      const done = await work(context);
      await keep(locked, done, context);
      return done.result;
    },
    { repeatable: options.repeatable },
  );
}
