import { QueryTypes } from 'sequelize';
import { decide } from '@/lib/conduct/decide';
import type { DecisionActor, TrialCommand } from '@/lib/conduct/decision';
import { TRIAL_EVENT_SCHEMA_VERSION, type TrialEvent, trialEventSchema } from '@/lib/conduct/events';
import { noticesFor } from '@/lib/conduct/notices';
import type { TrialState } from '@/lib/conduct/state';
import { models, sequelize } from '@/lib/db/connection';
import { inTransaction } from '@/lib/db/transaction';
import { notFound, RefusedError } from '@/lib/errors';
import { newId, sha256 } from '@/lib/hash';
import { type DirectoryEntry, loadTrialState } from '@/lib/queries/load-trial-state';
import { trialNoticeSchema } from '@/lib/schemas/mail-payloads';
import { SIGNED_COMMANDS } from '@/lib/schemas/trial-inputs';
import { SOFTWARE_VERSION } from '@/lib/software-version';
import { appendToChain, type ChainHead } from './append-to-chain';
import { checkTeamChange } from './check-team-change';
import { commandTime } from './command-time';
import type { ProvenIdentity } from './prove-identity';
import { queueMails } from './queue-mails';
import { saveTrialState } from './save-trial-state';
import { submissionResult, storeSubmission } from './submissions';

/** Commands of a trial that are the administrator's, who has no role in it. */
const ADMINISTRATOR_COMMANDS: readonly TrialCommand['type'][] = [
  'add-site',
  'grant-membership',
  'end-membership',
];

export interface TrialCommandRequest {
  readonly personId: string;
  readonly trialCode: string;
  readonly command: TrialCommand;
  /** Made once by the form; the same key posted again changes nothing and gets the same answer. */
  readonly submissionKey: string;
  /** Address and password proven again, before the transaction; required for signatures. */
  readonly identity?: ProvenIdentity;
  /** The clock, for building demonstrations with earlier times; the server's otherwise. */
  readonly clock?: () => number;
}

/** What a command answers with: the kinds of the events it brought about, and the trial's state after it. */
export interface TrialCommandResult {
  readonly events: readonly TrialEvent['payload']['kind'][];
  readonly trialState: TrialState['trial']['state'];
}

interface LockedTrial {
  id: string;
  version: number;
  chainSequence: number;
  chainHead: string;
  chainTime: Date | null;
  clockOffset: number;
}

/** The first statement of every command: the trial's row, locked until the commit. */
async function lockTrial(trialCode: string): Promise<LockedTrial> {
  const rows: LockedTrial[] = await sequelize().query(
    `SELECT t.id, t.version, t.chain_sequence AS chainSequence, t.chain_head AS chainHead,
       t.chain_time AS chainTime,
       (SELECT i.clock_offset_milliseconds FROM installation i WHERE i.id = 1) AS clockOffset
     FROM trials t WHERE t.code = :trialCode FOR UPDATE`,
    { type: QueryTypes.SELECT, replacements: { trialCode } },
  );
  const trial = rows[0];
  if (!trial) throw notFound('This trial');
  return trial;
}

async function actorOf(request: TrialCommandRequest, state: TrialState): Promise<DecisionActor> {
  const person = await models().Person.findByPk(request.personId);
  if (!person || person.state !== 'active') throw notFound('This trial');
  if (request.identity && request.identity.passwordHash !== person.passwordHash) {
    throw new RefusedError({
      code: 'conflict',
      message: 'Your password was changed while you were signing. Sign again with the new one.',
    });
  }
  if (ADMINISTRATOR_COMMANDS.includes(request.command.type)) {
    if (!person.isAdministrator) throw notFound('This trial');
    await checkTeamChange(request.command, person.id);
    return { personId: person.id, printedName: person.printedName, role: 'administrator' };
  }
  const member = state.members[person.id];
  if (!member || member.endedAt !== null) throw notFound('This trial');
  return { personId: person.id, printedName: person.printedName, role: member.role };
}

/** Queues the mails that events bring about; each carries the chain's head after them. */
async function queueNotices(
  events: readonly TrialEvent[],
  state: TrialState,
  people: Readonly<Record<string, DirectoryEntry>>,
  eventIds: readonly string[],
  head: ChainHead,
  now: string,
): Promise<void> {
  await queueMails(
    noticesFor(events, state).flatMap((notice) => {
      const person = people[notice.personId];
      if (!person?.isActive) return [];
      const payload = trialNoticeSchema.parse({ ...notice.payload, chainHead: head.hash });
      return [
        {
          kind: payload.kind,
          cause: eventIds[notice.eventIndex] ?? '',
          personId: notice.personId,
          address: person.email,
          payload,
          priority: notice.priority,
        },
      ];
    }),
    now,
  );
}

/**
 * Runs one command on a trial, in one transaction: lock the trial's row, answer a repeated submission with its first
 * result, load, decide (which authorises against the loaded state), save rows with trail and outbox, store the
 * submission. Run again as a whole after a deadlock or a conflict at commit.
 * @throws RefusedError with the sentence to show; nothing was then recorded
 */
export async function runTrialCommand(request: TrialCommandRequest): Promise<TrialCommandResult> {
  const { command, submissionKey } = request;
  if (SIGNED_COMMANDS.includes(command.type) && request.identity?.personId !== request.personId) {
    throw new RefusedError({
      code: 'wrong-credentials',
      message: 'Signing asks for your own e-mail address and password again.',
    });
  }
  return inTransaction(
    async () => {
      const locked = await lockTrial(request.trialCode);
      const earlier = await submissionResult(request.personId, submissionKey, command.type);
      if (earlier !== null) return earlier as TrialCommandResult;
      const { state: before, people } = await loadTrialState(locked.id);
      const actor = await actorOf(request, before);
      const now = commandTime((request.clock ?? Date.now)(), locked.clockOffset, locked.chainTime);
      const decision = decide(before, command, {
        now,
        actor,
        newId,
        sha256,
        softwareVersion: SOFTWARE_VERSION,
      });
      if (!decision.ok) throw new RefusedError(decision.refusal);
      const { events, state: after } = decision;
      await saveTrialState(before, after);
      const appended = await appendToChain(
        locked.id,
        { sequence: locked.chainSequence, hash: locked.chainHead },
        events.map((event) => ({
          ...event,
          kind: event.payload.kind,
          payload: trialEventSchema.parse(event.payload),
        })),
        TRIAL_EVENT_SCHEMA_VERSION,
      );
      await models().Trial.update(
        {
          state: after.trial.state,
          version: locked.version + 1,
          chainSequence: appended.head.sequence,
          chainHead: appended.head.hash,
          chainTime: new Date(now),
        },
        { where: { id: locked.id } },
      );
      await queueNotices(events, after, people, appended.eventIds, appended.head, now);
      const result: TrialCommandResult = {
        events: events.map((event) => event.payload.kind),
        trialState: after.trial.state,
      };
      await storeSubmission(request.personId, submissionKey, command.type, result, now);
      return result;
    },
    { repeatable: true },
  );
}
