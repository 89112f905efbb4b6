import { canonicalize } from 'json-canonicalize';
import { type ChainLink, linkHash, payloadDigest } from '@/lib/conduct/chain';
import { models } from '@/lib/db/connection';
import { newId, newSalt, sha256 } from '@/lib/hash';

/** The head of a chain, as kept with the trial's or the installation's row. */
export interface ChainHead {
  readonly sequence: number;
  readonly hash: string;
}

export interface AppendedEvent {
  readonly occurredAt: string;
  readonly personId: string | null;
  readonly role: string;
  readonly kind: string;
  readonly payload: object;
}

/**
 * Appends events to a chain in the caller's transaction, which holds the lock on the row that keeps the head.
 * @returns the new head and the ids of the events, in order
 */
export async function appendToChain(
  chain: string,
  head: ChainHead,
  events: readonly AppendedEvent[],
  schemaVersion: number,
): Promise<{ head: ChainHead; eventIds: string[] }> {
  const links: ChainLink[] = [];
  const payloads: { eventId: string; schemaVersion: number; salt: string; payload: string }[] = [];
  let { sequence, hash } = head;
  for (const event of events) {
    const stored = { salt: newSalt(), payload: canonicalize(event.payload) };
    sequence += 1;
    const link = {
      id: newId(),
      chain,
      sequence,
      occurredAt: event.occurredAt,
      personId: event.personId,
      role: event.role,
      kind: event.kind,
      payloadDigest: payloadDigest(sha256, stored),
      previousHash: hash,
    };
    hash = linkHash(sha256, link);
    links.push({ ...link, hash });
    payloads.push({ eventId: link.id, schemaVersion, ...stored });
  }
  const { Event, EventPayload } = models();
  await Event.bulkCreate(links.map((link) => ({ ...link, occurredAt: new Date(link.occurredAt) })));
  await EventPayload.bulkCreate(payloads);
  return { head: { sequence, hash }, eventIds: links.map((link) => link.id) };
}
