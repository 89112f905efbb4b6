import fc from 'fast-check';

/** Cases a property is tried on: 100 in every run, 1,000 under `npm run soak` (STEPWELL_SOAK=1). */
export const PROPERTY_RUNS = process.env.STEPWELL_SOAK ? 1000 : 100;

/**
 * Checks a property on generated inputs; a failure shows the seed and the smallest counterexample found.
 *
 * @param property made with fast-check's `fc.property`. @param runs default {@link PROPERTY_RUNS}.
 */
export function check<T>(property: fc.IProperty<T>, runs = PROPERTY_RUNS): void {
  fc.assert(property, { numRuns: runs });
}
