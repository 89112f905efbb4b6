import { describe, expect, it } from 'vitest';
import { newToken, tokenDigest } from './tokens';

describe('tokens', () => {
  it('have 256 bits, safe in an address, and none comes twice', () => {
    const tokens = Array.from({ length: 500 }, newToken);
    expect(new Set(tokens).size).toBe(500);
    for (const token of tokens) {
      expect(token).toMatch(/^[A-Za-z0-9_-]{43}$/);
      expect(Buffer.from(token, 'base64url')).toHaveLength(32);
    }
  });

  it('are stored as their SHA-256 (FIPS 180-4, example "abc")', () => {
    expect(tokenDigest('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
  });
});
