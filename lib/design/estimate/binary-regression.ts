import { inverseMillsRatio, logNormalCdf, normalCdf, normalQuantile } from '../distributions/normal';
import { logit } from '../distributions/logistic';
import { existenceStatus, type ExistenceStatus } from './existence';

export type Link = 'logit' | 'probit';
export type FitMethod = 'maximum-likelihood' | 'firth';
/** How a fit ended; `not-converged` leaves the last state in the fields. */
export type FitOutcome = 'fitted' | 'no-maximum' | 'not-converged';

const MAX_ITERATIONS = 100;
/** Squared length of the last Newton step in units of standard errors. */
const DECREMENT = 1e-24;

/** Response probability of a link at a linear predictor. */
export function linkInverse(link: Link, eta: number): number {
  if (link === 'probit') return normalCdf(eta);
  return eta >= 0 ? 1 / (1 + Math.exp(-eta)) : Math.exp(eta) / (1 + Math.exp(eta));
}

/** Linear predictor at which a link has response probability p. */
export function linkFunction(link: Link, p: number): number {
  return link === 'logit' ? logit(p) : normalQuantile(p);
}

/**
 * Fits link(P) = α + βx to grouped binary data by maximum likelihood or by Firth's penalised likelihood (penalty
 * ½ ln|X'WX|, W the link's expected information), by Newton's method with step halving on a standardised dose. One object
 * holds its rows, its working state and its last result, so that repeated fits allocate nothing.
 *
 * Sources: Wu (1985, JASA 80:974-984) for the use in a trial; Firth (1993, Biometrika 80:27-38) for the penalty; the
 * covariance is the inverse of the expected information at the estimate.
 */
export class BinaryRegression {
  readonly link: Link;
  readonly x: Float64Array;
  readonly n: Float64Array;
  readonly y: Float64Array;
  /** Rows in use. */
  count = 0;

  /** Estimates of the last fit, on the dose scale given. */
  intercept = NaN;
  slope = NaN;
  /** Covariance of (intercept, slope): [Vαα, Vαβ, Vββ]. */
  varianceIntercept = NaN;
  covariance = NaN;
  varianceSlope = NaN;
  /** Σ y ln p + (n − y) ln(1 − p), plus Firth's penalty where that was the method. */
  logLikelihood = NaN;
  iterations = 0;
  /** Whether a maximum exists, as found by the last maximum-likelihood fit (or {@link existence}). */
  status: ExistenceStatus = 'no-data';

  /** Where the objective is evaluated: fields, because doubles handed to a function may be boxed. */
  private a = 0;
  private b = 0;
  private centre = 0;
  private scale = 1;
  private objective = 0;
  private g0 = 0;
  private g1 = 0;
  private i00 = 0;
  private i01 = 0;
  private i11 = 0;
  private h00 = 0;
  private h01 = 0;
  private h11 = 0;
  private d0 = 0;
  private d1 = 0;

  /** @param link logit or probit. @param capacity the most rows that will ever be held. */
  constructor(link: Link, capacity: number) {
    this.link = link;
    this.x = new Float64Array(capacity);
    this.n = new Float64Array(capacity);
    this.y = new Float64Array(capacity);
  }

  /** Forgets all rows. */
  clear(): void {
    this.count = 0;
  }

  /**
   * Adds subjects at a dose, merged with the row of exactly that dose if there is one.
   *
   * @param x dose, working scale. @param n evaluable subjects. @param y responses, 0 ≤ y ≤ n.
   * @throws RangeError for numbers outside their range or when the capacity is exceeded.
   */
  add(x: number, n: number, y: number): void {
    if (!Number.isFinite(x) || !Number.isFinite(n) || !(y >= 0 && y <= n)) {
      throw new RangeError(`A dose row needs a finite dose and 0 <= y <= n, got x=${x}, n=${n}, y=${y}.`);
    }
    if (n === 0) return;
    for (let i = 0; i < this.count; i++) {
      if (this.x[i] === x) {
        this.n[i] = (this.n[i] as number) + n;
        this.y[i] = (this.y[i] as number) + y;
        return;
      }
    }
    if (this.count === this.x.length) throw new RangeError(`More than ${this.count} doses for one fit.`);
    this.x[this.count] = x;
    this.n[this.count] = n;
    this.y[this.count] = y;
    this.count++;
  }

  /** Whether the likelihood of the rows held has a finite maximum. */
  existence(): ExistenceStatus {
    this.status = existenceStatus(this.x, this.n, this.y, this.count);
    return this.status;
  }

  /**
   * Fits the rows held; the result is left in the fields.
   *
   * @returns `fitted`; `no-maximum` when there is none (see `status`; Firth's fit lacks one only without data or when all
   * doses are equal); `not-converged` when Newton's method did not settle, with the last state in the fields.
   */
  fit(method: FitMethod): FitOutcome {
    const status = this.existence();
    this.intercept = this.slope = NaN;
    this.varianceIntercept = this.covariance = this.varianceSlope = this.logLikelihood = NaN;
    this.iterations = 0;
    if (method === 'maximum-likelihood' && status !== 'exists') return 'no-maximum';
    if (!this.standardize()) return 'no-maximum';
    return this.newton(method === 'firth');
  }

  private standardize(): boolean {
    let total = 0;
    let sum = 0;
    for (let i = 0; i < this.count; i++) {
      total += this.n[i] as number;
      sum += (this.n[i] as number) * (this.x[i] as number);
    }
    if (!(total > 0)) return false;
    this.centre = sum / total;
    let squares = 0;
    let differ = false;
    for (let i = 0; i < this.count; i++) {
      const deviation = (this.x[i] as number) - this.centre;
      squares += (this.n[i] as number) * deviation * deviation;
      if (this.x[i] !== this.x[0]) differ = true;
    }
    this.scale = Math.sqrt(squares / total);
    return differ && this.scale > 0;
  }

  private newton(firth: boolean): FitOutcome {
    let total = 0;
    let responses = 0;
    for (let i = 0; i < this.count; i++) {
      total += this.n[i] as number;
      responses += this.y[i] as number;
    }
    let a = linkFunction(this.link, (responses + 0.5) / (total + 1));
    let b = 0;
    this.a = a;
    this.b = b;
    this.evaluate(firth);
    let settled = false;
    while (!settled && this.iterations < MAX_ITERATIONS) {
      this.iterations++;
      this.step();
      const d0 = this.d0;
      const d1 = this.d1;
      const decrement = d0 * this.g0 + d1 * this.g1;
      if (!Number.isFinite(decrement)) break;
      settled = decrement <= DECREMENT;
      const before = this.objective;
      const slack = 1e-12 * (1 + Math.abs(before));
      let fraction = 1;
      this.a = a + d0;
      this.b = b + d1;
      this.evaluate(firth);
      while (!(this.objective >= before - slack) && fraction > 1e-9) {
        fraction /= 2;
        this.a = a + fraction * d0;
        this.b = b + fraction * d1;
        this.evaluate(firth);
      }
      a += fraction * d0;
      b += fraction * d1;
    }
    this.report(a, b, firth);
    return settled && Number.isFinite(this.varianceSlope) ? 'fitted' : 'not-converged';
  }

  /**
   * Newton's step; where the objective is not concave (Firth's need not be), each eigenvalue of the negative Hessian counts
   * by its size, which leaves a flat stretch quickly. Such a step is at most 4 long on the standardised dose.
   */
  private step(): void {
    let { h00, h01, h11 } = this;
    const { g0, g1 } = this;
    const half = (h00 - h11) / 2;
    const root = Math.sqrt(half * half + h01 * h01);
    const mean = (h00 + h11) / 2;
    const floor = 1e-10 * (Math.abs(mean) + root);
    const concave = mean - root > floor;
    if (!concave) {
      const large = Math.max(Math.abs(mean + root), floor);
      const small = Math.max(Math.abs(mean - root), floor);
      const cosine = root > 0 ? half / root : 1;
      const sine = root > 0 ? h01 / root : 0;
      h00 = (large + small) / 2 + (cosine * (large - small)) / 2;
      h11 = (large + small) / 2 - (cosine * (large - small)) / 2;
      h01 = (sine * (large - small)) / 2;
    }
    const determinant = h00 * h11 - h01 * h01;
    const d0 = (h11 * g0 - h01 * g1) / determinant;
    const d1 = (h00 * g1 - h01 * g0) / determinant;
    const length = Math.sqrt(d0 * d0 + d1 * d1);
    const shrink = !concave && length > 4 ? 4 / length : 1;
    this.d0 = d0 * shrink;
    this.d1 = d1 * shrink;
  }

  private report(a: number, b: number, firth: boolean): void {
    const ratio = this.centre / this.scale;
    const determinant = this.i00 * this.i11 - this.i01 * this.i01;
    const v00 = this.i11 / determinant;
    const v01 = -this.i01 / determinant;
    const v11 = this.i00 / determinant;
    this.slope = b / this.scale;
    this.intercept = a - b * ratio;
    this.varianceSlope = v11 / (this.scale * this.scale);
    this.covariance = v01 / this.scale - (v11 * ratio) / this.scale;
    this.varianceIntercept = v00 - 2 * v01 * ratio + v11 * ratio * ratio;
    this.logLikelihood = this.objective + (firth ? Math.log(this.scale) : 0);
  }

  /** Objective, its gradient, its negative Hessian and the expected information at (a, b) on the standardised dose. */
  private evaluate(firth: boolean): void {
    const a = this.a;
    const b = this.b;
    let objective = 0;
    let g0 = 0;
    let g1 = 0;
    let h00 = 0;
    let h01 = 0;
    let h11 = 0;
    let w0 = 0;
    let w1 = 0;
    let w2 = 0;
    let first0 = 0;
    let first1 = 0;
    let first2 = 0;
    let first3 = 0;
    let second0 = 0;
    let second1 = 0;
    let second2 = 0;
    let second3 = 0;
    let second4 = 0;
    const probit = this.link === 'probit';
    for (let i = 0; i < this.count; i++) {
      const n = this.n[i] as number;
      const y = this.y[i] as number;
      const z = ((this.x[i] as number) - this.centre) / this.scale;
      const eta = a + b * z;
      let logP: number;
      let logQ: number;
      let score: number;
      let curvature: number;
      let weight: number;
      let slope: number;
      let bend: number;
      if (probit) {
        const millsP = inverseMillsRatio(eta);
        const millsQ = inverseMillsRatio(-eta);
        logP = logNormalCdf(eta);
        logQ = logNormalCdf(-eta);
        score = (y > 0 ? y * millsP : 0) - (n > y ? (n - y) * millsQ : 0);
        curvature =
          (y > 0 ? y * millsP * (eta + millsP) : 0) + (n > y ? (n - y) * millsQ * (millsQ - eta) : 0);
        weight = n * millsP * millsQ;
        slope = -2 * eta - millsP + millsQ;
        bend = -2 + millsP * (eta + millsP) + millsQ * (millsQ - eta);
      } else {
        const tail = Math.exp(-Math.abs(eta));
        const larger = 1 / (1 + tail);
        const smaller = tail * larger;
        const p = eta >= 0 ? larger : smaller;
        const logLarger = -Math.log1p(tail);
        logP = eta >= 0 ? logLarger : eta + logLarger;
        logQ = eta >= 0 ? logLarger - eta : logLarger;
        score = y - n * p;
        weight = n * larger * smaller;
        curvature = weight;
        slope = eta >= 0 ? smaller - larger : larger - smaller;
        bend = -2 * larger * smaller;
      }
      if (y > 0) objective += y * logP;
      if (n > y) objective += (n - y) * logQ;
      g0 += score;
      g1 += score * z;
      h00 += curvature;
      h01 += curvature * z;
      h11 += curvature * z * z;
      w0 += weight;
      w1 += weight * z;
      w2 += weight * z * z;
      if (firth) {
        const first = weight * slope;
        const second = weight * (slope * slope + bend);
        const square = z * z;
        first0 += first;
        first1 += first * z;
        first2 += first * square;
        first3 += first * square * z;
        second0 += second;
        second1 += second * z;
        second2 += second * square;
        second3 += second * square * z;
        second4 += second * square * square;
      }
    }
    if (firth) {
      // With V the inverse information, ∂/∂β_c ½ ln|I| = ½ tr(V I_c), and its derivative ½ tr(V I_cd) − ½ tr(V I_c V I_d).
      const determinant = w0 * w2 - w1 * w1;
      const v00 = w2 / determinant;
      const v01 = -w1 / determinant;
      const v11 = w0 / determinant;
      objective += 0.5 * Math.log(determinant);
      g0 += 0.5 * (v00 * first0 + 2 * v01 * first1 + v11 * first2);
      g1 += 0.5 * (v00 * first1 + 2 * v01 * first2 + v11 * first3);
      const a00 = v00 * first0 + v01 * first1;
      const a01 = v00 * first1 + v01 * first2;
      const a10 = v01 * first0 + v11 * first1;
      const a11 = v01 * first1 + v11 * first2;
      const b00 = a01;
      const b01 = v00 * first2 + v01 * first3;
      const b10 = a11;
      const b11 = v01 * first2 + v11 * first3;
      h00 -=
        0.5 * (v00 * second0 + 2 * v01 * second1 + v11 * second2 - (a00 * a00 + 2 * a01 * a10 + a11 * a11));
      h01 -=
        0.5 *
        (v00 * second1 + 2 * v01 * second2 + v11 * second3 - (a00 * b00 + a01 * b10 + a10 * b01 + a11 * b11));
      h11 -=
        0.5 * (v00 * second2 + 2 * v01 * second3 + v11 * second4 - (b00 * b00 + 2 * b01 * b10 + b11 * b11));
    }
    this.objective = objective;
    this.g0 = g0;
    this.g1 = g1;
    this.h00 = h00;
    this.h01 = h01;
    this.h11 = h11;
    this.i00 = w0;
    this.i01 = w1;
    this.i11 = w2;
  }
}
