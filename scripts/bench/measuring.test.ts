import { describe, expect, it } from 'vitest';
import { quantile, timesOf } from './aims';
import { scriptAddresses } from './client-scripts';

describe('a quantile of measured times', () => {
  // The definition of nearest rank, checked by counting (common practice, no source).
  it('is a measured value that the share of them does not exceed', () => {
    const hundred = Array.from({ length: 100 }, (_, index) => ((index * 37) % 100) + 1);
    expect(quantile(hundred, 0.5)).toBe(50);
    expect(quantile(hundred, 0.95)).toBe(95);
    expect(quantile([7], 0.95)).toBe(7);
    expect(quantile([9, 1], 0)).toBe(1);
    expect(timesOf([3, 1, 2])).toEqual({ samples: 3, p50: 2, p95: 3 });
  });

  it('is refused where nothing was measured', () => {
    expect(() => quantile([], 0.5)).toThrow('Nothing was measured.');
  });
});

describe('the scripts that a page loads', () => {
  // What browsers fetch: WHATWG HTML, script elements with src, link types modulepreload and preload (as=script).
  it('are script elements and preloads, each once, without those for browsers of before modules', () => {
    const html = `
      <link rel="preload" as="script" fetchPriority="low" nonce="x" href="/a.js"/>
      <link rel="modulepreload" href="/b.mjs"/>
      <link rel="preload" href="/font.woff2" as="font"/><link rel="stylesheet" href="/c.css"/>
      <script src="/a.js" async="" nonce="x"></script>
      <script src="/old.js" noModule=""></script>
      <script nonce="x">self.words = "a src is no address";</script>`;
    expect(scriptAddresses(html).sort()).toEqual(['/a.js', '/b.mjs']);
  });
});
