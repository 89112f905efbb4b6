import { createHash, randomBytes } from 'node:crypto';
import { v7 } from 'uuid';

/** SHA-256 (FIPS 180-4) of a text in UTF-8, as 64 lower-case hexadecimal digits. */
export function sha256(text: string): string {
  return createHash('sha256').update(text, 'utf8').digest('hex');
}

/** A new id (UUID version 7, RFC 9562): made by the application, ordered by time. */
export function newId(): string {
  return v7();
}

/** A new salt of a payload's digest: 128 random bits in hexadecimal. */
export function newSalt(): string {
  return randomBytes(16).toString('hex');
}
