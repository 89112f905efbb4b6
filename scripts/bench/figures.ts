import type { Times } from './aims';
import type { ClientScripts } from './client-scripts';
import type { DesignBenchRow } from './design';
import type { OutcomeTimes } from './outcome-action';
import type { StatementCount } from './statements';
import type { LoadFigures } from './under-load';

/** What was measured of one page. */
export interface PageFigures {
  readonly name: string;
  readonly role: string;
  readonly hasCharts: boolean;
  /** In a trial of 5 cohorts, and of 25. */
  readonly small: Times & StatementCount;
  readonly large: Times & StatementCount;
  /** After ten more trials of the same people. */
  readonly amongMany: StatementCount;
  readonly scripts: ClientScripts;
}

/** Everything one run measured; what `--json` writes. */
export interface BenchFigures {
  readonly measuredAt: string;
  readonly machine: {
    readonly processor: string;
    readonly cores: number;
    /** Processes that waited to run when the bench began: well above 0 on a machine with other work. */
    readonly loadBefore: number;
    readonly loadAfter: number;
    readonly node: string;
    readonly mariadb: string;
  };
  readonly cohorts: { readonly small: number; readonly large: number };
  readonly recommendations: readonly DesignBenchRow[];
  readonly outcomes: OutcomeTimes;
  readonly bare: Times & { readonly statements: number };
  readonly pages: readonly PageFigures[];
  readonly load: { readonly page: string; readonly ofPage: LoadFigures; readonly ofBare: LoadFigures };
  /** Pages that could not be measured, and why. */
  readonly failures: readonly string[];
}
