import { QueryTypes } from 'sequelize';
import {
  type ChainBreak,
  type ChainLink,
  INSTALLATION_CHAIN,
  type LinkPayload,
  verifyChain,
} from '@/lib/conduct/chain';
import { sequelize } from '@/lib/db/connection';
import { sha256 } from '@/lib/hash';

/** What verifying one chain found. */
export interface ChainVerdict {
  /** The trial's id, or "installation". */
  readonly chain: string;
  /** How people name it: the trial's code, or "installation". */
  readonly name: string;
  readonly events: number;
  /** SHA-256 of the last link, as kept with the trial or the installation. */
  readonly head: string;
  readonly lastEventAt: string | null;
  /** The first thing wrong, or null when the chain is whole. */
  readonly firstBreak: ChainBreak | null;
}

interface ChainRow {
  name: string;
  headSequence: number;
  head: string;
  id: string | null;
  chain: string;
  sequence: number;
  occurredAt: Date;
  personId: string | null;
  role: string;
  kind: string;
  payloadDigest: string;
  previousHash: string;
  hash: string;
  salt: string | null;
  payload: string | null;
  printedName: string | null;
}

/** Head, links and payloads come with one statement: a command that commits in between cannot look like a break. */
function chainSql(isInstallation: boolean): string {
  const [table, name, condition] = isInstallation
    ? ['installation', `'installation'`, 'h.id = 1']
    : ['trials', 'h.code', 'h.id = :chain'];
  return `SELECT ${name} AS name, h.chain_sequence AS headSequence, h.chain_head AS head,
      e.id, e.chain, e.sequence, e.occurred_at AS occurredAt, e.person_id AS personId, e.role, e.kind,
      e.payload_digest AS payloadDigest, e.previous_hash AS previousHash, e.hash, p.salt, p.payload,
      n.printed_name AS printedName
    FROM ${table} h
    LEFT JOIN events e ON e.chain = :chain
    LEFT JOIN event_payloads p ON p.event_id = e.id
    LEFT JOIN people n ON n.id = e.person_id
    WHERE ${condition} ORDER BY e.sequence`;
}

/** A link with what it says, where that still stands. */
export type StoredLink = ChainLink & { readonly stored: LinkPayload | null };

/** A chain as stored: its links, the names of who acted (by the person's id), and the verdict on it. */
export interface StoredChain {
  readonly links: readonly StoredLink[];
  readonly printedNames: ReadonlyMap<string, string>;
  readonly verdict: ChainVerdict;
}

function linkOf(row: ChainRow): StoredLink | null {
  if (row.id === null) return null;
  const { name: _name, headSequence: _sequence, head: _head, printedName: _by, salt, payload, ...link } = row;
  return {
    ...link,
    id: row.id,
    occurredAt: row.occurredAt.toISOString(),
    stored: salt === null || payload === null ? null : { salt, payload },
  };
}

/**
 * Loads a chain of the trail with its payloads and verifies it from its first link to its head, in one statement.
 * @param chain a trial's id, or "installation"
 * @returns the chain with the verdict on it, or null when there is none
 */
export async function storedChain(chain: string): Promise<StoredChain | null> {
  const rows = await sequelize().query<ChainRow>(chainSql(chain === INSTALLATION_CHAIN), {
    type: QueryTypes.SELECT,
    replacements: { chain },
  });
  const first = rows[0];
  if (first === undefined) return null;
  const links = rows.map(linkOf).filter((link) => link !== null);
  const printedNames = new Map(
    rows.flatMap(({ personId, printedName }) =>
      personId !== null && printedName !== null ? [[personId, printedName] as const] : [],
    ),
  );
  return {
    links,
    printedNames,
    verdict: {
      chain,
      name: first.name,
      events: links.length,
      head: first.head,
      lastEventAt: links.at(-1)?.occurredAt ?? null,
      firstBreak: verifyChain(links, { sequence: first.headSequence, hash: first.head }, sha256),
    },
  };
}

/** The verdict on a chain, or null when there is no such chain. */
export async function verifyStoredChain(chain: string): Promise<ChainVerdict | null> {
  return (await storedChain(chain))?.verdict ?? null;
}

/** The verdict on events whose trial is gone: its row was removed by somebody with wider rights. */
function orphan(chain: string, events: number): ChainVerdict {
  return {
    chain,
    name: `trial ${chain}, which is gone`,
    events,
    head: '',
    lastEventAt: null,
    firstBreak: { sequence: events + 1, eventId: null, reason: 'head-differs' },
  };
}

/** Verifies every chain of the installation, one after another: its own first, then the trials by code. */
export async function* verifyEveryChain(): AsyncGenerator<ChainVerdict> {
  const chains = await sequelize().query<{ chain: string; events: number | null }>(
    `SELECT '${INSTALLATION_CHAIN}' AS chain, NULL AS events
     UNION ALL (SELECT id, NULL FROM trials ORDER BY code LIMIT 1000000)
     UNION ALL (SELECT e.chain, COUNT(*) FROM events e LEFT JOIN trials t ON t.id = e.chain
       WHERE e.chain <> '${INSTALLATION_CHAIN}' AND t.id IS NULL GROUP BY e.chain)`,
    { type: QueryTypes.SELECT },
  );
  for (const { chain, events } of chains) {
    if (events !== null) yield orphan(chain, Number(events));
    else {
      const verdict = await verifyStoredChain(chain);
      if (verdict !== null) yield verdict;
    }
  }
}
