import { QueryTypes } from 'sequelize';
import { type ChainBreak, type ChainLink, verifyChain } from '@/lib/conduct/chain';
import { trialEventSchema, type TrialEventPayload } from '@/lib/conduct/events';
import { sequelize } from '@/lib/db/connection';
import { sha256 } from '@/lib/hash';
import { ROLE_NAMES, type TrialRole } from '@/lib/policy/roles';
import { readerTrial, type TrialReader } from './reader-trial';
import { type EventNames, eventInWords } from './event-in-words';

/** One event of a trial's trail, in words. */
export interface TrailEntry {
  readonly sequence: number;
  readonly occurredAt: string;
  readonly person: string;
  readonly role: string;
  readonly kind: TrialEventPayload['kind'];
  readonly what: string;
  readonly hash: string;
}

/** The trail of a trial, newest first, with the verdict on its chain. */
export interface TrailView {
  readonly code: string;
  /** The events of the page asked for. */
  readonly entries: readonly TrailEntry[];
  /** All events of the chain; every one of them was verified. */
  readonly count: number;
  readonly page: number;
  readonly pages: number;
  readonly head: string;
  readonly firstBreak: ChainBreak | null;
}

interface EventRow extends ChainLink {
  salt: string | null;
  payload: string | null;
  printedName: string | null;
  headSequence: number;
  head: string;
}

const isTrialRole = (role: string): role is TrialRole => role in ROLE_NAMES;

/** Events shown at once; the chain is verified whole whatever is shown. */
export const TRAIL_PAGE = 50;

/**
 * The trail of a trial for a reader, verified as it is read; null when the trial or the page is not theirs.
 * @param asked the page, from 1 with the newest events; one that is not there becomes the nearest
 */
export async function trailPage(reader: TrialReader, code: string, asked = 1): Promise<TrailView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('trail.read')) return null;
  const { state, people, sites } = trial.loaded;
  const rows = await sequelize().query<Omit<EventRow, 'occurredAt'> & { occurredAt: Date }>(
    `SELECT e.id, e.chain, e.sequence, e.occurred_at AS occurredAt, e.person_id AS personId, e.role, e.kind,
       e.payload_digest AS payloadDigest, e.previous_hash AS previousHash, e.hash, p.salt, p.payload,
       n.printed_name AS printedName, t.chain_sequence AS headSequence, t.chain_head AS head
     FROM trials t
     JOIN events e ON e.chain = t.id
     LEFT JOIN event_payloads p ON p.event_id = e.id
     LEFT JOIN people n ON n.id = e.person_id
     WHERE t.id = :trialId ORDER BY e.sequence`,
    { type: QueryTypes.SELECT, replacements: { trialId: state.trial.id } },
  );
  const first = rows[0];
  const links = rows.map(
    ({ salt, payload, printedName: _name, headSequence: _sequence, head: _head, ...link }) => ({
      ...link,
      occurredAt: link.occurredAt.toISOString(),
      stored: salt === null || payload === null ? null : { salt, payload },
    }),
  );
  const head = { sequence: first?.headSequence ?? 0, hash: first?.head ?? '' };
  const names: EventNames = {
    person: (id) => people[id]?.printedName ?? 'a person',
    site: (id) => sites[id]?.name ?? 'a site',
    subject: (id) => state.subjects[id]?.code ?? 'a subject',
    cohort: (id) => state.cohorts[id]?.number ?? null,
    recommendation: (id) => state.recommendations[id]?.number ?? null,
    design: Object.values(state.designVersions)[0]?.design ?? null,
  };
  const pages = Math.max(1, Math.ceil(rows.length / TRAIL_PAGE));
  const page = Math.min(Math.max(1, asked), pages);
  const end = rows.length - (page - 1) * TRAIL_PAGE;
  const entries = rows.slice(Math.max(0, end - TRAIL_PAGE), end).map((row): TrailEntry => {
    const parsed = row.payload === null ? null : trialEventSchema.safeParse(JSON.parse(row.payload));
    return {
      sequence: row.sequence,
      occurredAt: row.occurredAt.toISOString(),
      person: row.printedName ?? 'The server',
      role: isTrialRole(row.role) || row.role === 'administrator' ? ROLE_NAMES[row.role] : '',
      kind: row.kind as TrialEventPayload['kind'],
      what: parsed?.success ? eventInWords(parsed.data, names) : 'What this event says cannot be read.',
      hash: row.hash,
    };
  });
  return {
    code: state.trial.code,
    entries: entries.reverse(),
    count: rows.length,
    page,
    pages,
    head: head.hash,
    firstBreak: verifyChain(links, head, sha256),
  };
}
