import { expect, it } from 'vitest';
import { untilNextLook } from './session-clock';

// Worked by hand from: two minutes before the end, then every 15 seconds, never more often than every 5.
it.each([
  [30 * 60_000, 28 * 60_000],
  [120_001, 5_000],
  [120_000, 15_000],
  [20_000, 15_000],
  [7_000, 7_000],
  [0, 5_000],
  [-60_000, 5_000],
])('with %i ms left it looks again after %i ms', (left, wait) => {
  expect(untilNextLook(left)).toBe(wait);
});
