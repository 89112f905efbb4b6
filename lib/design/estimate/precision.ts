import type { Design, FinalEstimator, PrecisionRule } from '@/lib/schemas/design';
import { doseSetOf } from '../dose-set';
import { estimateTarget } from './estimate';
import { fitLogistic } from './logistic';
import { fitProbit } from './probit';
import { groupRows } from './rows';
import type { EstimationData, TargetEstimate } from './target-estimate';

/** Whether a trial may stop for precision, and what it was judged on. */
export interface PrecisionVerdict {
  readonly reached: boolean;
  /** The first condition that failed; null when reached. */
  readonly because:
    | 'too-few-subjects'
    | 'no-fit'
    | 'estimate-outside-doses-given'
    | 'no-bounded-interval'
    | 'interval-outside-doses'
    | 'too-wide'
    | null;
  readonly estimate: TargetEstimate | null;
}

/** The estimator a precision rule names, as settings of `estimateTarget`. */
export function precisionEstimator(rule: PrecisionRule): FinalEstimator {
  const intervalLevel = rule.level;
  switch (rule.estimator) {
    case 'last-iterate':
      return { name: 'last-iterate', intervalLevel };
    case 'logit-delta':
      return { name: 'logit', firth: false, interval: 'delta', intervalLevel };
    case 'logit-fieller':
      return { name: 'logit', firth: false, interval: 'fieller', intervalLevel };
    case 'probit-delta':
      return { name: 'probit', firth: false, interval: 'delta', intervalLevel };
    case 'probit-fieller':
      return { name: 'probit', firth: false, interval: 'fieller', intervalLevel };
  }
}

/**
 * The stopping rule "precision reached" (METHODS, step 8): enough subjects, responses and non-responses seen at two or more
 * doses, a maximum-likelihood fit, an estimate strictly inside the doses given, and a bounded interval of at most the stated
 * width with both ends within the design's doses.
 *
 * @param design a validated design. @param rule its precision rule; the width is on the working scale.
 * @param data what was given and seen, and the rule's values.
 */
export function precisionReached(
  design: Design,
  rule: PrecisionRule,
  data: EstimationData,
): PrecisionVerdict {
  const rows = groupRows(data.rows);
  const subjects = rows.reduce((sum, row) => sum + row.n, 0);
  if (subjects < rule.minimumSubjects) return { reached: false, because: 'too-few-subjects', estimate: null };
  const fit = rule.estimator.startsWith('probit') ? fitProbit(rows) : fitLogistic(rows);
  if (fit.outcome !== 'fitted') return { reached: false, because: 'no-fit', estimate: null };
  const estimate = estimateTarget(design, data, { estimator: precisionEstimator(rule) });
  const failed = (because: PrecisionVerdict['because']) => ({ reached: false, because, estimate });
  const lowest = rows[0]?.x as number;
  const highest = rows[rows.length - 1]?.x as number;
  if (estimate.x === null || !(estimate.x > lowest && estimate.x < highest)) {
    return failed('estimate-outside-doses-given');
  }
  const { interval } = estimate;
  if (interval?.type !== 'bounded' || interval.method === 'bootstrap') return failed('no-bounded-interval');
  const doses = doseSetOf(design.doses, design.scale);
  const lower = interval.lower as number;
  const upper = interval.upper as number;
  if (!(lower >= doses.working(0) && upper <= doses.working(doses.count - 1)))
    return failed('interval-outside-doses');
  if (!(upper - lower <= rule.width)) return failed('too-wide');
  return { reached: true, because: null, estimate };
}
