import type { ChainBreak } from '@/lib/conduct/chain';
import { trialEventSchema, type TrialEventPayload } from '@/lib/conduct/events';
import { ROLE_NAMES, type TrialRole } from '@/lib/policy/roles';
import { storedChain } from '../verify-chain';
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
  const chain = await storedChain(state.trial.id);
  if (chain === null) return null;
  const { links, printedNames, verdict } = chain;
  const names: EventNames = {
    person: (id) => people[id]?.printedName ?? 'a person',
    site: (id) => sites[id]?.name ?? 'a site',
    subject: (id) => state.subjects[id]?.code ?? 'a subject',
    cohort: (id) => state.cohorts[id]?.number ?? null,
    recommendation: (id) => state.recommendations[id]?.number ?? null,
    design: Object.values(state.designVersions)[0]?.design ?? null,
  };
  const pages = Math.max(1, Math.ceil(links.length / TRAIL_PAGE));
  const page = Math.min(Math.max(1, asked), pages);
  const end = links.length - (page - 1) * TRAIL_PAGE;
  const entries = links.slice(Math.max(0, end - TRAIL_PAGE), end).map((link): TrailEntry => {
    const parsed = link.stored === null ? null : trialEventSchema.safeParse(JSON.parse(link.stored.payload));
    return {
      sequence: link.sequence,
      occurredAt: link.occurredAt,
      person: printedNames.get(link.personId ?? '') ?? 'The server',
      role: isTrialRole(link.role) || link.role === 'administrator' ? ROLE_NAMES[link.role] : '',
      kind: link.kind as TrialEventPayload['kind'],
      what: parsed?.success ? eventInWords(parsed.data, names) : 'What this event says cannot be read.',
      hash: link.hash,
    };
  });
  return {
    code: state.trial.code,
    entries: entries.reverse(),
    count: links.length,
    page,
    pages,
    head: verdict.head,
    firstBreak: verdict.firstBreak,
  };
}
