import type { Design, FinalEstimator } from '@/lib/schemas/design';
import { normalQuantile } from '../distributions/normal';
import { doseSetOf, nearestIndex } from '../dose-set';
import { fromWorking, signOf } from '../scale';
import { curveSlopeFromLogit, robbinsMonroAsymptotics } from './asymptotics';
import type { Link } from './binary-regression';
import { BOOTSTRAP_SEED, bootstrapInterval } from './bootstrap';
import { fitBinary, type BinaryFit } from './fit';
import { isotonicEstimate } from './isotonic';
import { averagedIterates } from './polyak-ruppert';
import { quantileEstimate, SMALLEST_SLOPE } from './quantile';
import { groupRows, mirrorRows, type DoseRow } from './rows';
import type {
  EstimateFlag,
  EstimationData,
  NoEstimateReason,
  NoIntervalReason,
  TargetEstimate,
  TargetInterval,
} from './target-estimate';

type SetType = TargetInterval['type'];

/** Builds results in real doses from computations made on s·x. */
class Reporter {
  readonly flags: EstimateFlag[] = [];

  constructor(
    readonly design: Design,
    readonly estimator: FinalEstimator,
  ) {}

  get sign(): 1 | -1 {
    return signOf(this.design);
  }

  none(reason: NoEstimateReason, fit: BinaryFit | null = null): TargetEstimate {
    return { ...this.blank(), reason, intervalReason: reason, fit };
  }

  /** @param x on s·x; ends may be infinite or null. */
  interval(
    method: TargetInterval['method'],
    type: SetType,
    lower: number | null,
    upper: number | null,
  ): TargetInterval {
    const real = (end: number | null) => (end === null ? null : this.sign * end + 0);
    const [low, high] = this.sign > 0 ? [real(lower), real(upper)] : [real(upper), real(lower)];
    if (type !== 'bounded') this.flags.push('interval-not-bounded');
    return {
      method,
      type,
      level: this.estimator.intervalLevel,
      lower: low,
      upper: high,
      lowerDose: this.dose(low),
      upperDose: this.dose(high),
    };
  }

  estimate(
    x: number,
    interval: TargetInterval | NoIntervalReason | NoEstimateReason,
    more: Partial<TargetEstimate> = {},
  ): TargetEstimate {
    const real = this.sign * x + 0;
    const found = typeof interval === 'string' ? null : interval;
    return {
      ...this.blank(),
      x: real,
      dose: this.dose(real),
      interval: found,
      intervalReason: typeof interval === 'string' ? interval : null,
      ...more,
    };
  }

  private dose(x: number | null): number | null {
    return x === null ? null : fromWorking(this.design.scale, x);
  }

  private blank(): TargetEstimate {
    return {
      estimator: this.estimator.name,
      x: null,
      dose: null,
      reason: null,
      standardError: null,
      interval: null,
      intervalReason: null,
      flags: this.flags,
      bootstrap: null,
      fit: null,
      assignedMean: null,
    };
  }
}

/** Rows on s·x, grouped by dose; on levels by nearest level where `byLevel`. */
function signedRows(design: Design, data: EstimationData, byLevel: boolean): DoseRow[] {
  let rows = data.rows;
  if (byLevel && design.doses.kind === 'levels') {
    const doses = doseSetOf(design.doses, design.scale);
    rows = rows.map((row) => ({ ...row, x: doses.working(nearestIndex(doses, row.x, false)) }));
  }
  const grouped = groupRows(rows);
  return signOf(design) > 0 ? grouped : mirrorRows(grouped);
}

function curveEstimate(report: Reporter, data: EstimationData, link: Link, firth: boolean): TargetEstimate {
  const { design, estimator } = report;
  const rows = signedRows(design, data, false);
  if (rows.length === 0) return report.none('no-data');
  const result = fitBinary(link, rows, firth ? 'firth' : 'maximum-likelihood');
  if (result.outcome === 'not-converged') return report.none('not-converged');
  if (result.outcome === 'no-maximum') {
    return report.none(result.status === 'exists' || firth ? 'single-dose' : result.status);
  }
  const fit = report.sign > 0 ? result.fit : mirrorFit(result.fit);
  const quantile = quantileEstimate(result.fit, design.target, estimator.intervalLevel);
  if (quantile === null) return report.none('no-slope', fit);
  const { estimate, standardError, delta, fieller } = quantile;
  const first = rows[0] as DoseRow;
  const last = rows[rows.length - 1] as DoseRow;
  if (estimate < first.x || estimate > last.x) report.flags.push('extrapolated');
  const useDelta = 'interval' in estimator && estimator.interval === 'delta';
  const interval = useDelta
    ? report.interval('delta', 'bounded', delta.lower, delta.upper)
    : report.interval('fieller', fieller.type, fieller.lower, fieller.upper);
  return report.estimate(estimate, interval, { standardError, fit });
}

/** The fit of −x as a fit of x. */
function mirrorFit(fit: BinaryFit): BinaryFit {
  const [[intercept, covariance], [, slope]] = fit.covariance;
  return {
    ...fit,
    slope: -fit.slope,
    covariance: [
      [intercept, -covariance],
      [-covariance, slope],
    ],
  };
}

function isotonicTarget(
  report: Reporter,
  data: EstimationData,
  centred: boolean,
  seed: number,
): TargetEstimate {
  const { design, estimator, sign, flags } = report;
  const rows = signedRows(design, data, true);
  if (rows.length === 0) return report.none('no-data');
  const { status, estimate } = isotonicEstimate(rows, design.target, centred);
  if (status === 'flat') flags.push('flat');
  if (status === 'below-range') flags.push(sign > 0 ? 'beyond-lowest-dose' : 'beyond-highest-dose');
  if (status === 'above-range') flags.push(sign > 0 ? 'beyond-highest-dose' : 'beyond-lowest-dose');
  const drawn = bootstrapInterval(rows, design.target, estimator.intervalLevel, { centred, seed });
  if (drawn === null) return report.estimate(estimate, 'all-or-none');
  const bounded = drawn.lower !== null && drawn.upper !== null;
  const interval = report.interval(
    'bootstrap',
    bounded ? 'bounded' : 'partly-bounded',
    drawn.lower,
    drawn.upper,
  );
  const { draws, shareAtLowest, shareAtHighest } = drawn;
  return report.estimate(estimate, interval, {
    bootstrap: {
      draws,
      seed,
      shareAtLowest: sign > 0 ? shareAtLowest : shareAtHighest,
      shareAtHighest: sign > 0 ? shareAtHighest : shareAtLowest,
    },
  });
}

function lastIterate(report: Reporter, data: EstimationData): TargetEstimate {
  const { design, estimator, sign } = report;
  if (data.iterates.length === 0) return report.none('no-data');
  const x = sign * (data.iterates[data.iterates.length - 1] as number);
  const z = normalQuantile(0.5 + estimator.intervalLevel / 2);
  const { rule, target } = design;
  if (rule.name === 'joseph') {
    if (data.priorSd === null || data.priorSd === undefined) return report.estimate(x, 'rule-has-none');
    report.flags.push('model-based-interval');
    const half = z * data.priorSd;
    return report.estimate(x, report.interval('model-based', 'bounded', x - half, x + half), {
      standardError: data.priorSd,
    });
  }
  if (rule.name !== 'robbins-monro') return report.estimate(x, 'rule-has-none');
  if (design.doses.kind === 'levels') return report.estimate(x, 'levels');
  if (rule.gamma !== 1) return report.estimate(x, 'gain-exponent');
  if (rule.carry !== 'iterate') return report.estimate(x, 'carries-given');
  const cohorts = data.cohortSizes.length;
  if (cohorts === 0) return report.estimate(x, 'no-cohort');
  const result = fitBinary('logit', signedRows(design, data, false), 'maximum-likelihood');
  if (result.outcome !== 'fitted' || !(result.fit.slope > SMALLEST_SLOPE))
    return report.estimate(x, 'slope-unknown');
  let inverseSizes = 0;
  for (let k = 0; k < cohorts; k++) inverseSizes += 1 / (data.cohortSizes[k] as number);
  const outcomeVariance = (target * (1 - target) * inverseSizes) / cohorts;
  const slope = curveSlopeFromLogit(result.fit.slope, target);
  const { variance } = robbinsMonroAsymptotics(rule.c, slope, outcomeVariance);
  const fit = sign > 0 ? result.fit : mirrorFit(result.fit);
  if (variance === null) return report.estimate(x, 'gain-too-small', { fit });
  const standardError = Math.sqrt(variance / cohorts);
  const interval = report.interval('sacks', 'bounded', x - z * standardError, x + z * standardError);
  return report.estimate(x, interval, { standardError, fit });
}

function averaged(report: Reporter, data: EstimationData, burnIn: number): TargetEstimate {
  const { design, sign, flags } = report;
  const { withNext, assigned } = averagedIterates(data.iterates, burnIn);
  if (withNext === null) return report.none('burn-in');
  const { rule } = design;
  if ((rule.name === 'robbins-monro' || rule.name === 'kesten') && rule.gamma === 1) {
    flags.push('averaging-with-gain-exponent-one');
  }
  return report.estimate(sign * withNext, 'estimator-has-none', { assignedMean: assigned });
}

/**
 * The target dose estimated from a trial's data, with its interval.
 *
 * @param design a validated design; its rule, doses, scale, target and direction are used.
 * @param data what was given and seen, and the rule's values.
 * @param options another estimator than the design's final one; the seed of a bootstrap interval (a 32-bit integer).
 * @returns estimate and interval, or typed reasons (sentences in `estimateReasonTexts`); never throws for lack of data.
 * @throws RangeError for rows outside 0 ≤ y ≤ n.
 * Sources: those of the estimators' own files. Where response falls with dose, all run on −x and intervals swap ends.
 */
export function estimateTarget(
  design: Design,
  data: EstimationData,
  options: { readonly estimator?: FinalEstimator; readonly seed?: number } = {},
): TargetEstimate {
  const estimator = options.estimator ?? design.finalEstimator;
  const report = new Reporter(design, estimator);
  switch (estimator.name) {
    case 'last-iterate':
      return lastIterate(report, data);
    case 'polyak-ruppert':
      return averaged(report, data, estimator.burnIn);
    case 'isotonic':
    case 'centred-isotonic':
      return isotonicTarget(
        report,
        data,
        estimator.name === 'centred-isotonic',
        options.seed ?? BOOTSTRAP_SEED,
      );
    case 'logit':
    case 'probit':
      return curveEstimate(report, data, estimator.name, estimator.firth);
  }
}
