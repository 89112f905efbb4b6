/** Simulated trials that share the streams of one block. */
export const BLOCK_SIZE = 1024;

/** What random numbers are drawn for in a simulated trial, each from a stream of its own. */
export const randomPurposes = ['response', 'evaluability', 'time', 'review'] as const;
export type RandomPurpose = (typeof randomPurposes)[number];

/**
 * Index of the stream (see `streams.ts`) of a purpose in a block: block b takes the streams 4b … 4b + 3, so a run's numbers
 * depend on its seed alone, not on how its blocks are shared among workers.
 *
 * @param block a whole number ≥ 0.
 */
export function blockStreamIndex(block: number, purpose: RandomPurpose): number {
  return block * randomPurposes.length + randomPurposes.indexOf(purpose);
}
