import { randomBytes } from 'node:crypto';
import { hash, verify } from '@node-rs/argon2';

/**
 * Argon2id (RFC 9106) with the smallest cost OWASP's password storage cheat sheet recommends: 19 MiB of memory,
 * two passes, one lane.
 */
export const HASH_COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

/** A well-formed hash of the same cost that no password fits: a random tag, not the hash of anything. */
const unmatchedHash = [
  '',
  'argon2id',
  'v=19',
  `m=${HASH_COST.memoryCost},t=${HASH_COST.timeCost},p=${HASH_COST.parallelism}`,
  randomBytes(16).toString('base64').replace(/=+$/, ''),
  randomBytes(32).toString('base64').replace(/=+$/, ''),
].join('$');

/** What is hashed: Unicode's composed form (NFC), so that the same password typed on two systems is the same. */
const normalised = (password: string): string => password.normalize('NFC');

/**
 * Hashes a password with a new random salt, outside any transaction (it takes tens of milliseconds).
 * @returns the hash in PHC string format, with its own cost in it
 */
export function hashPassword(password: string): Promise<string> {
  // The library's algorithm is Argon2id unless told otherwise; its enumeration cannot be imported as a value.
  return hash(normalised(password), HASH_COST);
}

/**
 * Whether a password fits a stored hash. Without a hash (an unknown address, a person who has not chosen a password
 * yet) the same work is done against a hash nothing fits, so that the time taken tells nothing.
 */
export async function passwordMatches(password: string, storedHash: string | null): Promise<boolean> {
  const matches = await verify(storedHash ?? unmatchedHash, normalised(password));
  return matches && storedHash !== null;
}
