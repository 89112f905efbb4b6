import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import { blockStreamIndex, randomPurposes } from './blocks';
import { jumpedState, openStream, restoreStream, streamState } from './streams';

const seeds = fc.integer();

describe('streams', () => {
  it('continue from a saved state bit for bit', () => {
    check(
      fc.property(seeds, fc.nat(20), fc.nat(50), (seed, index, drawn) => {
        const stream = openStream(seed, index);
        for (let i = 0; i < drawn; i++) stream.uniform();
        const saved = JSON.parse(JSON.stringify(stream.state()));
        const rest = Array.from({ length: 5 }, () => stream.uniform());
        const again = restoreStream(saved);
        expect(Array.from({ length: 5 }, () => again.uniform())).toEqual(rest);
      }),
    );
  });

  it('are the same however they are reached', () => {
    check(
      fc.property(seeds, fc.nat(10), fc.nat(10), (seed, a, b) => {
        expect(jumpedState(streamState(seed, a), b)).toEqual(streamState(seed, a + b));
      }),
    );
  });

  it('jump by 2^64 numbers: the jump commutes with drawing', () => {
    const stream = openStream(7, 0);
    for (let i = 0; i < 9; i++) stream.uniform();
    const jumpedAfter = jumpedState(stream.state(), 1);
    const jumpedBefore = restoreStream(jumpedState(streamState(7, 0), 1));
    for (let i = 0; i < 9; i++) jumpedBefore.uniform();
    expect(jumpedBefore.state()).toEqual(jumpedAfter);
  });

  it('differ between blocks and purposes', () => {
    const starts = [0, 1, 2].flatMap((block) =>
      randomPurposes.map((purpose) => String(streamState(5, blockStreamIndex(block, purpose)))),
    );
    expect(new Set(starts).size).toBe(12);
  });

  // Mean 1/2, variance 1/12 of the uniform distribution; lag and cross-stream correlation 0. Bounds are 5 standard errors,
  // fixed seeds, consecutive ones because those correlate when used without a jump.
  it('are uniform, also across small consecutive seeds, and uncorrelated with their neighbours', () => {
    const n = 20000;
    let first = 0;
    for (let seed = 0; seed < 2000; seed++) first += openStream(seed, 0).uniform();
    expect(Math.abs(first / 2000 - 0.5)).toBeLessThan(5 * Math.sqrt(1 / 12 / 2000));
    for (const seed of [1, 2, 3]) {
      const a = openStream(seed, 0);
      const b = openStream(seed, 1);
      const c = openStream(seed + 1, 0);
      let sum = 0;
      let squares = 0;
      let cross = 0;
      let neighbour = 0;
      for (let i = 0; i < n; i++) {
        const u = a.uniform() - 0.5;
        sum += u;
        squares += u * u;
        cross += u * (b.uniform() - 0.5);
        neighbour += u * (c.uniform() - 0.5);
      }
      expect(Math.abs(sum / n)).toBeLessThan(5 * Math.sqrt(1 / 12 / n));
      expect(Math.abs(squares / n - 1 / 12)).toBeLessThan(5 * Math.sqrt(1 / 180 / n));
      expect(Math.abs(cross / n)).toBeLessThan((5 * (1 / 12)) / Math.sqrt(n));
      expect(Math.abs(neighbour / n)).toBeLessThan((5 * (1 / 12)) / Math.sqrt(n));
    }
  });

  it('refuse seeds, indices and states that are none', () => {
    expect(() => openStream(2 ** 32, 0)).toThrow(RangeError);
    expect(() => openStream(0.5, 0)).toThrow(RangeError);
    expect(() => openStream(1, -1.5)).toThrow(RangeError);
    expect(() => restoreStream([0, 0, 0, 0])).toThrow(RangeError);
    expect(() => restoreStream([1, 2, 3, 0.5])).toThrow(RangeError);
  });
});
