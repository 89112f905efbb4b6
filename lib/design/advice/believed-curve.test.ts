import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import {
  curveSlopeFrom,
  curveThroughPoints,
  curveThroughTarget,
  doseAtProbability,
  responseProbability,
  slopesAtTarget,
  slopesFromCurve,
  type BelievedCurve,
} from './believed-curve';

function taken<T, E>(result: { ok: true; value: T } | { ok: false; error: E }): T {
  if (!result.ok) throw new Error(JSON.stringify(result.error));
  return result.value;
}

const probabilities = fc.integer({ min: 2, max: 98 }).map((p) => p / 100);

describe('believed curves', () => {
  it('go through both points, on either scale, link and direction', () => {
    check(
      fc.property(
        fc.constantFrom('logit' as const, 'probit' as const),
        fc.constantFrom('linear' as const, 'log' as const),
        fc.integer({ min: 1, max: 100 }),
        fc.integer({ min: 1, max: 100 }),
        fc.uniqueArray(probabilities, { minLength: 2, maxLength: 2 }),
        (link, scale, dose, further, [p, q]) => {
          const points = [
            { dose, probability: p as number },
            { dose: dose + further, probability: q as number },
          ] as const;
          const direction = (q as number) > (p as number) ? 1 : -1;
          const curve = taken(curveThroughPoints(link, points, scale, direction));
          for (const point of points) {
            expect(responseProbability(curve, point.dose)).toBeCloseTo(point.probability, 10);
            expect(doseAtProbability(curve, point.probability)).toBeCloseTo(point.dose, 6);
          }
          expect(curveThroughPoints(link, points, scale, -direction as 1 | -1).ok).toBe(false);
        },
      ),
    );
  });

  it('have the slope D = |M′(θ)| at the target dose, by a difference quotient', () => {
    check(
      fc.property(
        fc.constantFrom('logit' as const, 'probit' as const),
        fc.constantFrom(1 as const, -1 as const),
        probabilities,
        fc.double({ min: 0.01, max: 2, noNaN: true }),
        (link, direction, target, slope) => {
          const curve = taken(curveThroughTarget(link, target, 20, slope, 'linear', direction));
          expect(responseProbability(curve, 20)).toBeCloseTo(target, 12);
          const h = 1e-4 / slope;
          const quotient =
            (responseProbability(curve, 20 + h) - responseProbability(curve, 20 - h)) / (2 * h);
          expect(quotient / (direction * slope)).toBeCloseTo(1, 5);
          const slopes = slopesAtTarget(curve, target);
          expect(slopes.curve).toBeCloseTo(slope, 10);
          expect(Math.abs(curve.slope)).toBeCloseTo(link === 'logit' ? slopes.logit : slopes.probit, 10);
        },
      ),
    );
  });

  it('keep the three slopes apart: D, β_L = D/(Γ(1 − Γ)), β_P = D/φ(Φ⁻¹(Γ))', () => {
    const slopes = slopesFromCurve(0.21, 0.3);
    expect(slopes.logit).toBeCloseTo(1, 12);
    // φ(Φ⁻¹(0.3)) = 0.347693 (normal tables)
    expect(slopes.probit).toBeCloseTo(0.21 / 0.347693, 5);
    for (const kind of ['curve', 'logit', 'probit'] as const) {
      expect(curveSlopeFrom(kind, -slopes[kind], 0.3)).toBeCloseTo(0.21, 12);
    }
  });

  it.each([
    [
      [
        { dose: 0, probability: 0.1 },
        { dose: 5, probability: 0.4 },
      ],
      'log',
      ['points', 0, 'dose'],
    ],
    [
      [
        { dose: NaN, probability: 0.1 },
        { dose: 5, probability: 0.4 },
      ],
      'linear',
      ['points', 0, 'dose'],
    ],
    [
      [
        { dose: 5, probability: 0.1 },
        { dose: 5, probability: 0.4 },
      ],
      'linear',
      ['points', 1, 'dose'],
    ],
    [
      [
        { dose: 1, probability: 0.1 },
        { dose: 5, probability: 1 },
      ],
      'linear',
      ['points', 1, 'probability'],
    ],
    [
      [
        { dose: 1, probability: 0.1 },
        { dose: 5, probability: 0.1 },
      ],
      'linear',
      ['points', 1, 'probability'],
    ],
  ] as const)('refuse %j on the %s scale, naming the field', (points, scale, path) => {
    const result = curveThroughPoints('logit', points, scale, 1);
    expect(result).toMatchObject({ ok: false, error: { path } });
    if (!result.ok) expect(result.error.message).toMatch(/\.$/);
  });

  it('refuse a target dose or slope that is none', () => {
    expect(curveThroughTarget('logit', 0.3, 0, 0.2, 'log', 1)).toMatchObject({
      ok: false,
      error: { path: ['targetDose'] },
    });
    expect(curveThroughTarget('logit', 0.3, 5, 0, 'log', 1)).toMatchObject({
      ok: false,
      error: { path: ['slope'] },
    });
  });

  it('on the log scale the slope is per unit of ln dose', () => {
    const curve: BelievedCurve = taken(
      curveThroughPoints(
        'logit',
        [
          { dose: 10, probability: 0.1 },
          { dose: 40, probability: 0.5 },
        ],
        'log',
        1,
      ),
    );
    expect(curve.slope).toBeCloseTo(Math.log(9) / Math.log(4), 12);
  });
});
