import { createHash, randomBytes } from 'node:crypto';

/** A new secret value of 256 random bits, safe in an address and in a cookie. */
export function newToken(): string {
  return randomBytes(32).toString('base64url');
}

/** What is stored of a token, and what it is found by: its SHA-256, in hexadecimal. */
export function tokenDigest(token: string): string {
  return createHash('sha256').update(token, 'utf8').digest('hex');
}
