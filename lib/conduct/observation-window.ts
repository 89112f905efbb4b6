import type { Design } from '@/lib/schemas/design';
import type { Instant } from './state';

const MILLISECONDS = { days: 86_400_000, hours: 3_600_000 } as const;

/**
 * The end of the observation window of a subject dosed at an instant. A day of the window is 24 hours
 * (ISO 8601 duration), so that a change of the clocks neither shortens nor lengthens it.
 */
export function windowEnd(dosedAt: Instant, window: Design['observationWindow']): Instant {
  return new Date(Date.parse(dosedAt) + window.length * MILLISECONDS[window.unit]).toISOString();
}
