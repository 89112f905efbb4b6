import type { Design } from '@/lib/schemas/design';
import { exceedsCutoff } from './estimate/exceedance';

export type ClosingSettings = NonNullable<Design['guardrails']['closing']>;

const UNKNOWN = -1;

/** METHODS step 7's criterion for one design, with the smallest closing count of each n remembered. */
export class ClosingCriterion {
  private boundary: Int32Array = new Int32Array(64).fill(UNKNOWN);

  constructor(
    readonly settings: ClosingSettings,
    readonly target: number,
  ) {}

  /** True when n evaluable subjects with y responses close their level. */
  isMet(n: number, y: number): boolean {
    return n >= this.settings.minimumEvaluable && y >= this.smallestClosing(n);
  }

  /** The smallest number of responses in n subjects whose posterior exceeds the cutoff; n + 1 when none does. */
  smallestClosing(n: number): number {
    if (n >= this.boundary.length) {
      const larger = new Int32Array(Math.max(n + 1, 2 * this.boundary.length)).fill(UNKNOWN);
      larger.set(this.boundary);
      this.boundary = larger;
    }
    let y = this.boundary[n] as number;
    if (y === UNKNOWN) {
      // the probability rises with y: bisect
      const { priorA, priorB, cutoff } = this.settings;
      let low = 0;
      let high = n + 1; // n + 1 stands for none
      while (low < high) {
        const middle = (low + high) >> 1;
        if (exceedsCutoff(middle, n, this.target, priorA, priorB, cutoff)) high = middle;
        else low = middle + 1;
      }
      y = low;
      this.boundary[n] = y;
    }
    return y;
  }
}
