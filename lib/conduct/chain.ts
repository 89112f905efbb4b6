import { canonicalize } from 'json-canonicalize';
import type { Instant } from './state';

/** A link of a chain of the trail, as stored. */
export interface ChainLink {
  readonly id: string;
  /** The trial's id, or "installation". */
  readonly chain: string;
  readonly sequence: number;
  readonly occurredAt: Instant;
  readonly personId: string | null;
  readonly role: string;
  readonly kind: string;
  readonly payloadDigest: string;
  readonly previousHash: string;
  readonly hash: string;
}

/** The payload of a link, stored apart, with the salt of its digest. */
export interface LinkPayload {
  readonly salt: string;
  readonly payload: string;
}

/** The chain of what concerns the installation rather than one trial. */
export const INSTALLATION_CHAIN = 'installation';
/** What the first link of a chain is hashed over. */
export const CHAIN_START = '';

/** Digest of a payload: SHA-256 of its salt and its stored canonical text. */
export function payloadDigest(sha256: (text: string) => string, { salt, payload }: LinkPayload): string {
  return sha256(`${salt}\n${payload}`);
}

/** Hash of a link over the one before it: SHA-256 of the canonical text (RFC 8785) of all its other fields. */
export function linkHash(sha256: (text: string) => string, link: Omit<ChainLink, 'hash'>): string {
  return sha256(canonicalize(link));
}

/** The first thing wrong with a chain. */
export interface ChainBreak {
  readonly sequence: number;
  readonly eventId: string | null;
  readonly reason:
    | 'missing'
    | 'out-of-order'
    | 'hash-differs'
    | 'not-linked'
    | 'payload-missing'
    | 'payload-differs'
    | 'head-differs';
}

/** What each break means, as a sentence. */
export const BREAK_WORDS: Readonly<Record<ChainBreak['reason'], string>> = {
  missing: 'An event is missing here.',
  'out-of-order': 'An event stands earlier in time than the one before it.',
  'hash-differs': 'The event was changed after it was stored.',
  'not-linked': 'The event is not linked to the one before it.',
  'payload-missing': 'What the event says is missing.',
  'payload-differs': 'What the event says was changed after it was stored.',
  'head-differs': 'Events were cut off the end of the chain.',
};

/**
 * Verifies a chain from its first link to its head. Returns the first break, or null when it is whole. `links` are
 * the chain's events in ascending sequence; `head` is the sequence and hash kept with the trial or installation.
 */
export function verifyChain(
  links: readonly (ChainLink & { readonly stored: LinkPayload | null })[],
  head: { readonly sequence: number; readonly hash: string },
  sha256: (text: string) => string,
): ChainBreak | null {
  let previousHash = CHAIN_START;
  let previousTime = '';
  let expected = 1;
  for (const { stored, hash, ...link } of links) {
    const broken = (reason: ChainBreak['reason']): ChainBreak => ({
      sequence: expected,
      eventId: link.id,
      reason,
    });
    if (link.sequence !== expected) return { ...broken('missing'), eventId: null };
    if (link.previousHash !== previousHash) return broken('not-linked');
    if (linkHash(sha256, link) !== hash) return broken('hash-differs');
    if (link.occurredAt < previousTime) return broken('out-of-order');
    if (stored === null) return broken('payload-missing');
    if (payloadDigest(sha256, stored) !== link.payloadDigest) return broken('payload-differs');
    previousHash = hash;
    previousTime = link.occurredAt;
    expected += 1;
  }
  if (head.sequence !== expected - 1 || head.hash !== previousHash) {
    return { sequence: expected, eventId: null, reason: 'head-differs' };
  }
  return null;
}
