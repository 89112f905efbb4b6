import stdlibLogGamma from '@stdlib/math-base-special-gammaln';
import stdlibBetaCdf from '@stdlib/stats-base-dists-beta-cdf';
import stdlibBetaQuantile from '@stdlib/stats-base-dists-beta-quantile';
import stdlibBinomialCdf from '@stdlib/stats-base-dists-binomial-cdf';
import stdlibNormalCdf from '@stdlib/stats-base-dists-normal-cdf';
import stdlibNormalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import jstat from 'jstat';
import { afterAll, describe, expect, it } from 'vitest';
import { Deviations, readReference } from '@/tests/reference/read-reference';
import {
  betaCdf,
  betaDensity,
  betaQuantile,
  betaSurvival,
  binomialCdf,
  binomialProbability,
  binomialSurvival,
  bivariateNormalEqual,
  expit,
  gaussLegendreRule,
  integrate,
  inverseMillsRatio,
  logGamma,
  logit,
  logNormalCdf,
  normalCdf,
  normalDensity,
  normalQuantile,
  owensT,
} from '.';

const lines: string[] = [];
afterAll(() => console.log(lines.join('\n')));

/** Largest relative difference over a grid of arguments, with the place; NaN never passes. */
function largestDifference(
  own: (...x: number[]) => number,
  other: (...x: number[]) => number,
  grid: number[][],
): { relative: number; at: string } {
  let relative = 0;
  let at = '';
  for (const point of grid) {
    const a = own(...point);
    const b = other(...point);
    if (a === b) continue;
    const difference = Math.abs(a - b) / Math.max(Math.abs(a), Math.abs(b));
    if (!(difference <= relative)) {
      relative = difference;
      at = `(${point.join(', ')}): ${a} against ${b}`;
    }
  }
  return { relative, at };
}

function compare(
  name: string,
  own: (...x: number[]) => number,
  other: (...x: number[]) => number,
  grid: number[][],
  allowed: number,
): void {
  const { relative, at } = largestDifference(own, other, grid);
  lines.push(`${name}: ${grid.length} points, largest relative difference ${relative.toExponential(1)}`);
  if (!(relative <= allowed)) throw new Error(`${name} differs by ${relative} at ${at}`);
}

function range(from: number, to: number, step: number): number[] {
  return Array.from({ length: Math.floor((to - from) / step + 1e-9) + 1 }, (_, i) => from + i * step);
}

function product(...lists: number[][]): number[][] {
  return lists.reduce<number[][]>((rows, list) => rows.flatMap((row) => list.map((x) => [...row, x])), [[]]);
}

const arguments_: Record<string, { of: string[]; own: (...x: number[]) => number }> = {
  normal_cdf: { of: ['q'], own: normalCdf },
  normal_quantile: { of: ['p'], own: normalQuantile },
  log_gamma: { of: ['z'], own: logGamma },
  beta_cdf: { of: ['x', 'a', 'b'], own: betaCdf },
  beta_quantile: { of: ['p', 'a', 'b'], own: betaQuantile },
  bvn_equal: { of: ['h', 'rho'], own: bivariateNormalEqual },
};

describe('values of base R (reference 00)', () => {
  for (const c of readReference<Record<string, number[]>, { value: number[] }>('00_special_functions.json')) {
    it(c.id, () => {
      const { of, own } = arguments_[c.id] as (typeof arguments_)[string];
      const deviations = new Deviations(`special functions, ${c.id}`);
      const got = c.outputs.value.map((_, i) => own(...of.map((name) => c.inputs[name]?.[i] as number)));
      deviations.compare(got, c.outputs.value, c.tolerance, c.id);
      lines.push(deviations.summary());
    });
  }
});

const betaShapes = [
  [0.01, 0.3, 0.5, 1, 2, 3.3, 7, 20, 81, 200, 1000],
  [0.01, 0.3, 0.5, 1, 2.5, 12, 45.5, 150, 900],
];
const betaPoints = [1e-12, 1e-6, 1e-3, 0.01, 0.05, 0.2, 0.25, 0.3, 0.5, 0.6, 0.75, 0.9, 0.97, 0.999];
const betaCdfGrid = product(betaPoints, ...betaShapes);
const betaProbabilities = [
  1e-12,
  1e-6,
  0.001,
  0.01,
  0.025,
  0.05,
  0.1,
  0.5,
  0.9,
  0.95,
  0.975,
  0.999,
  1 - 1e-9,
];
const betaQuantileGrid = product(betaProbabilities, ...betaShapes.map((list) => list.slice(1)));
const normalGrid = product(range(-37, 8, 0.0625));
const binomialGrid = [1, 3, 6, 10, 24, 60, 200].flatMap((n) =>
  product(range(0, n, Math.ceil(n / 12)), [n], [0.001, 0.01, 0.1, 0.25, 0.3, 0.5, 0.9, 0.99]),
);
// @stdlib's and jstat's binomial cdf lose the digits of results near 1e-16 and below; those are compared as 1 + cdf.
const above =
  (f: (...x: number[]) => number) =>
  (...x: number[]) =>
    1 + f(...x);

describe('@stdlib, over grids with tails', () => {
  it('normal cdf', () => {
    compare('normal cdf, @stdlib', normalCdf, (x) => stdlibNormalCdf(x as number, 0, 1), normalGrid, 1e-12);
  });
  it('normal quantile', () => {
    const centre = product([...range(0.001, 0.999, 0.001), ...range(-8, -3, 0.25).map((e) => 10 ** e)]);
    compare(
      'normal quantile, @stdlib',
      normalQuantile,
      (p) => stdlibNormalQuantile(p as number, 0, 1),
      centre,
      2e-9,
    );
    // Below 1e-8 @stdlib's quantile loses digits and below 1e-16 it is −∞; its cdf, exact there, takes the place.
    const tail = product(range(-300, -8, 1.3).map((e) => 10 ** e));
    compare(
      'normal quantile through the cdf of @stdlib',
      (p) => stdlibNormalCdf(normalQuantile(p as number), 0, 1),
      (p) => p as number,
      tail,
      1e-12,
    );
  });
  it('log gamma', () => {
    const grid = product(range(-3, 6, 0.07).map((e) => 10 ** e));
    compare('log gamma, @stdlib', logGamma, (z) => stdlibLogGamma(z as number), grid, 1e-12);
  });
  it('beta cdf and survival', () => {
    compare('beta cdf, @stdlib', betaCdf, stdlibBetaCdf as (...x: number[]) => number, betaCdfGrid, 1e-11);
    const mirrored = (x: number, a: number, b: number) => stdlibBetaCdf(1 - x, b, a);
    const grid = betaCdfGrid.filter(
      ([x, a, b]) => (x as number) >= 1e-3 && betaSurvival(x as number, a as number, b as number) > 1e-300,
    );
    compare('beta survival, @stdlib', betaSurvival, mirrored as (...x: number[]) => number, grid, 1e-11);
  });
  it('beta quantile', () => {
    compare(
      'beta quantile, @stdlib',
      betaQuantile,
      stdlibBetaQuantile as (...x: number[]) => number,
      betaQuantileGrid.filter(([p]) => (p as number) > 1e-3 && (p as number) < 1 - 1e-3),
      1e-9,
    );
    compare(
      'beta quantile through the cdf of @stdlib',
      (p, a, b) =>
        stdlibBetaCdf(betaQuantile(p as number, a as number, b as number), a as number, b as number),
      (p) => p as number,
      betaQuantileGrid.filter(
        ([p, a, b]) =>
          (p as number) < 0.99 &&
          betaQuantile(p as number, a as number, b as number) < 0.5 &&
          betaQuantile(p as number, a as number, b as number) > 1e-300,
      ),
      1e-11,
    );
  });
  it('binomial cdf', () => {
    compare(
      'binomial cdf, @stdlib',
      above(binomialCdf),
      above(stdlibBinomialCdf as (...x: number[]) => number),
      binomialGrid,
      1e-13,
    );
  });
});

describe('jstat, where it is accurate', () => {
  it('normal cdf to 1e-12 above −3', () => {
    const jstatCdf = (x: number) => jstat.normal.cdf(x, 0, 1);
    compare(
      'normal cdf, jstat',
      normalCdf,
      jstatCdf as (...x: number[]) => number,
      product(range(-3, 8, 0.0625)),
      1e-12,
    );
  });
  it('normal quantile to 1e-8 between 0.001 and 0.999', () => {
    const jstatQuantile = (p: number) => jstat.normal.inv(p, 0, 1);
    const grid = product(range(0.001, 0.999, 0.001).filter((p) => Math.abs(p - 0.5) > 1e-9));
    compare(
      'normal quantile, jstat',
      normalQuantile,
      jstatQuantile as (...x: number[]) => number,
      grid,
      1e-8,
    );
  });
  it('log gamma to 1e-11', () => {
    const grid = product(range(-3, 6, 0.07).map((e) => 10 ** e));
    compare('log gamma, jstat', logGamma, jstat.gammaln as (...x: number[]) => number, grid, 1e-11);
  });
  it('beta cdf to 1e-5', () => {
    compare('beta cdf, jstat', betaCdf, jstat.beta.cdf as (...x: number[]) => number, betaCdfGrid, 1e-5);
  });
  it('beta quantile to 1e-6 in the middle of moderate shapes', () => {
    const grid = product(
      [0.025, 0.05, 0.1, 0.5, 0.9, 0.95, 0.975],
      [0.5, 1, 2, 3.3, 7, 20],
      [0.5, 1, 2.5, 12, 45.5],
    );
    compare('beta quantile, jstat', betaQuantile, jstat.beta.inv as (...x: number[]) => number, grid, 1e-6);
  });
  it('binomial cdf to 1e-9', () => {
    compare(
      'binomial cdf, jstat',
      above(binomialCdf),
      above(jstat.binomial.cdf as (...x: number[]) => number),
      binomialGrid,
      1e-9,
    );
  });
});

describe('identities', () => {
  const rule = gaussLegendreRule(40);

  it("Owen's T by quadrature in ten panels, |a| above 1 included", () => {
    const byQuadrature = (h: number, a: number) => {
      const density = (x: number) => Math.exp(-0.5 * h * h * (1 + x * x)) / (1 + x * x);
      return (
        range(0, 9, 1).reduce(
          (sum, i) => sum + integrate(density, (i * a) / 10, ((i + 1) * a) / 10, rule),
          0,
        ) /
        (2 * Math.PI)
      );
    };
    const grid = product([0.1, 0.5, 1, 2, 3.5, 5, 8, 12], [0.05, 0.3, 0.6, 0.99, 1, 1.3, 3]);
    compare("Owen's T, quadrature", owensT, byQuadrature as (...x: number[]) => number, grid, 1e-11);
    expect(owensT(0, 1)).toBeCloseTo(1 / 8, 15);
    expect(owensT(1, Infinity)).toBeCloseTo(normalCdf(-1) / 2, 16);
    expect(owensT(-2, -0.5)).toBe(-owensT(2, 0.5));
  });

  it('the beta density integrates to the cdf', () => {
    for (const [a, b] of [
      [2, 3],
      [7.5, 4.25],
      [80, 45.5],
    ] as const) {
      const area = integrate((x) => betaDensity(x, a, b), 0.2, 0.7, rule);
      expect(area).toBeCloseTo(betaCdf(0.7, a, b) - betaCdf(0.2, a, b), 12);
    }
  });

  it('binomial probabilities add up to the cdf and to one', () => {
    for (const [n, p] of [
      [1, 0.3],
      [7, 0.02],
      [24, 0.25],
      [60, 0.9],
    ] as const) {
      let sum = 0;
      for (let y = 0; y <= n; y++) {
        sum += binomialProbability(y, n, p);
        expect(sum).toBeCloseTo(binomialCdf(y, n, p), 13);
        expect(binomialSurvival(y, n, p)).toBeCloseTo(1 - sum, 13);
      }
      expect(sum).toBeCloseTo(1, 13);
    }
  });

  it('logit and expit undo each other, far tails included', () => {
    for (const eta of [-700, -40, -3, -1e-9, 0, 0.4, 5, 20])
      expect(logit(expit(eta))).toBeCloseTo(eta, eta > 10 ? 6 : 9);
  });

  it('ln Φ and φ/Φ join where the continued fraction takes over', () => {
    expect(logNormalCdf(-30 - 1e-9)).toBeCloseTo(logNormalCdf(-30), 6);
    expect(inverseMillsRatio(-30 - 1e-12)).toBeCloseTo(normalDensity(-30) / normalCdf(-30), 10);
    expect(inverseMillsRatio(-36)).toBeCloseTo(normalDensity(36) / normalCdf(-36), 9);
    expect(inverseMillsRatio(-1e5)).toBeCloseTo(1e5, 4);
  });
});

describe('arguments outside their range give NaN, ends their limit', () => {
  it.each([
    ['normalQuantile(-0.1)', normalQuantile(-0.1), NaN],
    ['normalQuantile(1.1)', normalQuantile(1.1), NaN],
    ['normalQuantile(0)', normalQuantile(0), -Infinity],
    ['normalQuantile(1)', normalQuantile(1), Infinity],
    ['normalCdf(NaN)', normalCdf(NaN), NaN],
    ['normalCdf(-50)', normalCdf(-50), 0],
    ['normalCdf(Infinity)', normalCdf(Infinity), 1],
    ['logGamma(0)', logGamma(0), NaN],
    ['betaCdf(0.5, 0, 1)', betaCdf(0.5, 0, 1), NaN],
    ['betaCdf(-1, 2, 1)', betaCdf(-1, 2, 1), 0],
    ['betaCdf(2, 2, 1)', betaCdf(2, 2, 1), 1],
    ['betaSurvival(0, 2, 1)', betaSurvival(0, 2, 1), 1],
    ['betaQuantile(-1, 2, 1)', betaQuantile(-1, 2, 1), NaN],
    ['betaQuantile(0, 2, 1)', betaQuantile(0, 2, 1), 0],
    ['betaQuantile(1, 2, 1)', betaQuantile(1, 2, 1), 1],
    ['binomialCdf(2, 5, 1.5)', binomialCdf(2, 5, 1.5), NaN],
    ['binomialCdf(-1, 5, 0.5)', binomialCdf(-1, 5, 0.5), 0],
    ['binomialCdf(5, 5, 0.5)', binomialCdf(5, 5, 0.5), 1],
    ['binomialProbability(0, 3, 0)', binomialProbability(0, 3, 0), 1],
    ['binomialProbability(1.5, 3, 0.5)', binomialProbability(1.5, 3, 0.5), 0],
    ['logit(2)', logit(2), NaN],
  ])('%s', (_, got, expected) => expect(got).toBe(expected));
});
