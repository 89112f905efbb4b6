import { describe, expect, it } from 'vitest';
import { HASH_COST, hashPassword, passwordMatches } from './passwords';

/** The shortest of a few runs, in milliseconds: the work itself, without what else the machine does. */
async function shortest(work: () => Promise<unknown>): Promise<number> {
  let least = Infinity;
  for (let run = 0; run < 5; run += 1) {
    const start = performance.now();
    await work();
    least = Math.min(least, performance.now() - start);
  }
  return least;
}

describe('stored hashes', () => {
  it('are Argon2id of version 1.3 at OWASP’s cost, each with a salt of its own', async () => {
    // OWASP Password Storage Cheat Sheet: Argon2id with m = 19456 KiB, t = 2, p = 1 as a minimum. RFC 9106: version 19.
    const [one, other] = await Promise.all([
      hashPassword('quiet stone stair'),
      hashPassword('quiet stone stair'),
    ]);
    expect(HASH_COST).toEqual({ memoryCost: 19456, timeCost: 2, parallelism: 1 });
    expect(one).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$[A-Za-z0-9+/]{22,}\$[A-Za-z0-9+/]{43}$/);
    expect(other).not.toBe(one);
  });

  it('are matched by their password alone, all of its characters counting', async () => {
    const long = `${'a'.repeat(199)}b`;
    const hash = await hashPassword(long);
    expect(await passwordMatches(long, hash)).toBe(true);
    expect(await passwordMatches(`${'a'.repeat(199)}c`, hash)).toBe(false);
    expect(await passwordMatches(long.slice(0, 72), hash)).toBe(false);
  });

  it('are matched however an accent was typed (Unicode Standard Annex 15, composed form)', async () => {
    const hash = await hashPassword('ångström stair');
    expect(await passwordMatches('a\u030angstro\u0308m stair', hash)).toBe(true);
  });
});

describe('no stored hash', () => {
  it('matches nothing', async () => {
    expect(await passwordMatches('', null)).toBe(false);
    expect(await passwordMatches('quiet stone stair', null)).toBe(false);
  });

  it('takes the same work as a wrong password (OWASP ASVS 5.0, 6.3.8)', async () => {
    const hash = await hashPassword('quiet stone stair');
    const wrong = await shortest(() => passwordMatches('another', hash));
    const unknown = await shortest(() => passwordMatches('another', null));
    expect(unknown).toBeGreaterThan(wrong / 2);
    expect(unknown).toBeLessThan(wrong * 2);
  });
});
