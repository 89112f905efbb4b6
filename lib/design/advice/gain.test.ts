import { describe, expect, it } from 'vitest';
import { assessGain, gainAt, linearisedError, longRunGain } from './gain';

describe('assessGain', () => {
  // Efficiency (2ξ − 1)/ξ², computed in Python.
  it.each([
    [0.6, 0.5556],
    [0.75, 0.8889],
    [1, 1],
    [1.5, 0.8889],
    [2, 0.75],
    [4, 0.4375],
  ])('ξ = %d has efficiency %d', (share, efficiency) => {
    const assessment = assessGain({ c: share / 0.21, k0: 0, gamma: 1 }, 0.21, 0.3, 3, 30);
    expect(assessment.efficiency).toBeCloseTo(efficiency, 4);
    expect(assessment.share).toBeCloseTo(share, 12);
    expect(assessment.tooSmall).toBe(false);
    const best = assessment.bestError / (assessment.asymptoticError as number);
    expect(best * best).toBeCloseTo(assessment.efficiency as number, 12);
  });

  it('values of base R (reference 08, asym-opt-030): standard error after 200 cohorts', () => {
    const assessment = assessGain({ c: 4.7619047619047619, k0: 2, gamma: 1 }, 0.21, 0.3, 3, 200);
    expect(assessment.asymptoticError).toBeCloseTo(0.08908708063747478, 12);
    expect(assessment.bestGain).toBeCloseTo(4.7619047619047619, 12);
  });

  it('2cD ≤ 1 is too small: no large-sample error, but the linear one', () => {
    const assessment = assessGain({ c: 0.5 / 0.21, k0: 0, gamma: 1 }, 0.21, 0.3, 3, 30);
    expect(assessment).toMatchObject({ tooSmall: true, efficiency: 0, asymptoticError: null });
    expect(assessment.linearError).toBeGreaterThan(assessment.bestError);
  });
});

describe('linearisedError', () => {
  const sigma2 = 0.07;

  it('with c = 1/D and k0 = 0 is σ/(D√n) exactly: the recursion is then a running mean', () => {
    for (const n of [1, 2, 7, 30, 400]) {
      expect(linearisedError({ c: 1 / 0.21, k0: 0, gamma: 1 }, 0.21, sigma2, n, 5)).toBeCloseTo(
        Math.sqrt(sigma2 / n) / 0.21,
        12,
      );
    }
  });

  it('comes to the large-sample error of Chung and Sacks, and of Chung for γ < 1', () => {
    for (const gains of [
      { c: 9.5, k0: 0, gamma: 1 },
      { c: 3.6, k0: 5, gamma: 1 },
      { c: 4, k0: 0, gamma: 0.7 },
    ]) {
      const n = 200_000;
      const { asymptoticError } = assessGain(gains, 0.21, 0.3, 3, n);
      expect(
        Math.abs(linearisedError(gains, 0.21, sigma2, n) / (asymptoticError as number) - 1),
      ).toBeLessThan(0.01);
    }
  });

  it('before the first cohort is the error of the start', () => {
    expect(linearisedError({ c: 5, k0: 0, gamma: 1 }, 0.21, sigma2, 0, 3)).toBe(3);
  });
});

it('a rule’s long-run gain', () => {
  expect(gainAt({ c: 6, k0: 1, gamma: 1 }, 2)).toBe(2);
  expect(gainAt({ c: 6, k0: 0, gamma: 0.5 }, 4)).toBe(3);
  const target = 0.5;
  expect(longRunGain({ name: 'virtual-observations', slope: 0.2, carryBounds: null }, 1, target).c).toBe(5);
  // φ(0) = 1/√(2π)
  expect(longRunGain({ name: 'joseph', slope: 0.5, priorSd: 1 }, 1, target).c).toBeCloseTo(
    2 * Math.sqrt(2 * Math.PI),
    12,
  );
  const adaptive = {
    name: 'adaptive-slope',
    form: 'last',
    initialSlope: 1,
    slopeLow: 0.5,
    slopeHigh: 2,
    weighted: false,
  } as const;
  expect(longRunGain({ ...adaptive, carry: 'iterate', carryReason: null }, 4, target).c).toBe(0.5);
  expect(longRunGain({ name: 'logit-ml', firth: true, c: 1, largestMove: 1 }, 4, target).c).toBe(0.25);
  expect(
    longRunGain({ name: 'kesten', c: 3, k0: 1, gamma: 0.8, carry: 'iterate', carryReason: null }, 4, target),
  ).toEqual({
    c: 3,
    k0: 1,
    gamma: 0.8,
  });
});
