import { describe, expect, it } from 'vitest';
import { designSchema, type Design } from './design';
import { designDefaults } from './design-defaults';

/** A default design with one place changed; `path` like "rule.gamma", `undefined` removes. */
function changed(kind: Design['doses']['kind'], changes: Record<string, unknown>): unknown {
  const design: unknown = structuredClone(designDefaults(kind));
  for (const [path, value] of Object.entries(changes)) {
    const keys = path.split('.');
    const last = keys.pop() as string;
    let at = design as Record<string, unknown>;
    for (const key of keys) at = at[key] as Record<string, unknown>;
    if (value === undefined) delete at[last];
    else at[last] = value;
  }
  return design;
}

function refusals(design: unknown): Record<string, string> {
  const parsed = designSchema.safeParse(design);
  return Object.fromEntries(
    (parsed.error?.issues ?? []).map((issue) => [issue.path.join('.'), issue.message]),
  );
}

const robbinsMonro = { name: 'robbins-monro', c: 4, k0: 0, gamma: 1, carry: 'iterate', carryReason: null };

describe('designSchema', () => {
  it.each(['levels', 'range'] as const)(
    'takes the defaults for %s, and reads its own output as itself',
    (kind) => {
      const design = designSchema.parse(designDefaults(kind));
      expect(designSchema.parse(design)).toEqual(design);
    },
  );

  it('fills in what may be left out, so that the stored text is complete', () => {
    const design = designSchema.parse(
      changed('levels', { doseNotation: undefined, 'guardrails.tiesReason': undefined }),
    );
    expect(design).toMatchObject({ doseNotation: 'plain', guardrails: { tiesReason: null } });
  });

  it.each<[string, Design['doses']['kind'], Record<string, unknown>, string, RegExp]>([
    ['a NaN target', 'levels', { target: NaN }, 'target', /not a number/],
    ['a target of 0', 'levels', { target: 0 }, 'target', /is 0; it must be a number above 0 and below 1/],
    ['a target of 1', 'levels', { target: 1 }, 'target', /is 1/],
    ['a target as text', 'levels', { target: '0.25' }, 'target', /not a number/],
    [
      'a negative cohort size',
      'levels',
      { cohortSize: -3 },
      'cohortSize',
      /is -3; it must be a whole number/,
    ],
    ['half a cohort', 'levels', { cohortSize: 2.5 }, 'cohortSize', /is 2.5; it must be a whole number/],
    ['too many cohorts', 'levels', { maximumCohorts: 201 }, 'maximumCohorts', /at most 200/],
    ['an infinite gain', 'range', { 'rule.c': 1e309 }, 'rule.c', /too large/],
    ['a gain of 0', 'range', { 'rule.c': 0 }, 'rule.c', /above 0/],
    ['a negative offset', 'range', { 'rule.k0': -1 }, 'rule.k0', /at least 0/],
    ['an exponent of one half', 'range', { 'rule.gamma': 0.5 }, 'rule.gamma', /Σa_k = ∞.*Σa_k² < ∞/],
    ['an exponent above 1', 'range', { 'rule.gamma': 1.01 }, 'rule.gamma', /at most 1/],
    ['an unknown rule', 'range', { 'rule.name': 'guess' }, 'rule.name', /not one of robbins-monro/],
    ['an unknown setting', 'levels', { extra: 1 }, '', /no setting named "extra"/],
    [
      'levels that repeat',
      'levels',
      { 'doses.levels': ['10', '20', '20.0'] },
      'doses.levels.2',
      /not above level 2/,
    ],
    ['levels that fall', 'levels', { 'doses.levels': ['10', '40', '20'] }, 'doses.levels.2', /lowest first/],
    ['one level', 'levels', { 'doses.levels': ['10'] }, 'doses.levels', /2 to 50 levels/],
    [
      'ten thousand levels',
      'levels',
      { 'doses.levels': Array.from({ length: 10_000 }, (_, i) => String(i + 1)) },
      'doses.levels',
      /There are 10000 levels/,
    ],
    [
      'a dose of 0 on the log scale',
      'levels',
      { 'doses.levels': ['0', '10', '20'] },
      'doses.levels.0',
      /no logarithm/,
    ],
    ['a lowest dose of 0 on the log scale', 'range', { 'doses.lowest': '0' }, 'doses.lowest', /no logarithm/],
    [
      'a level that is no decimal',
      'levels',
      { 'doses.levels': ['10', 'NaN'] },
      'doses.levels.1',
      /not a decimal/,
    ],
    ['a level with an exponent', 'levels', { 'doses.levels': ['10', '1e309'] }, 'doses.levels.1', /exponent/],
    [
      'a starting dose off the levels',
      'levels',
      { startingDose: '15' },
      'startingDose',
      /none of the levels/,
    ],
    ['a starting dose off the grid', 'range', { startingDose: '10.5' }, 'startingDose', /not on the grid/],
    ['an increment of 0', 'range', { 'doses.increment': '0' }, 'doses.increment', /increment is 0/],
    [
      'a range that ends below its start',
      'range',
      { 'doses.highest': '5' },
      'doses.highest',
      /not above the lowest/,
    ],
    ['a grid too fine', 'range', { 'doses.increment': '0.001' }, 'doses.increment', /holds 110001 doses/],
    ['a grid of one dose', 'range', { 'doses.increment': '500' }, 'doses.increment', /one dose only/],
    ['a unit in common use', 'levels', { unit: 'mcg' }, 'unit', /Enter ug/],
    ['international units', 'levels', { unit: 'IU' }, 'unit', /Enter \[iU\]/],
    ['a unit in the wrong case', 'levels', { unit: 'MG' }, 'unit', /Enter mg/],
    ['a megagram', 'levels', { unit: 'Mg/m2' }, 'unit', /mega or giga/],
    ['a long unit', 'levels', { unit: 'm'.repeat(5_000_000) }, 'unit', /longer than 40/],
    ['a long label', 'levels', { 'response.present': 'x'.repeat(5_000_000) }, 'response.present', /too long/],
    [
      'a label of 61 characters',
      'levels',
      { 'response.present': 'x'.repeat(61) },
      'response.present',
      /61 characters/,
    ],
    [
      'a control character',
      'levels',
      { 'response.present': 'a\u0007b' },
      'response.present',
      /control character/,
    ],
    ['a bidi mark', 'levels', { 'response.present': 'a\u202eb' }, 'response.present', /turns text/],
    ['a zero-width space', 'levels', { 'response.absent': 'no\u200bne' }, 'response.absent', /hides/],
    [
      'the same label twice',
      'levels',
      { 'response.absent': 'Dose-limiting toxicity' },
      'response.absent',
      /same/,
    ],
    ['an empty label', 'levels', { 'response.absent': '  ' }, 'response.absent', /empty/],
    ['events-count', 'levels', { pending: 'events-count' }, 'pending', /not yet offered/],
    ['weighted', 'levels', { pending: 'weighted' }, 'pending', /not yet offered/],
    [
      'the dose given carried on levels without reason',
      'levels',
      { rule: { ...robbinsMonro, carry: 'given' } },
      'rule.carryReason',
      /ratchets down and then freezes/,
    ],
    [
      'slopes the wrong way round',
      'range',
      {
        rule: {
          name: 'adaptive-slope',
          form: 'last',
          initialSlope: 1,
          slopeLow: 2,
          slopeHigh: 1,
          weighted: true,
          carry: 'iterate',
        },
      },
      'rule.slopeHigh',
      /below the smallest/,
    ],
    [
      'no largest rise for a harm on a range',
      'range',
      { 'guardrails.largestRise': null },
      'guardrails.largestRise',
      /must be bounded/,
    ],
    [
      'a largest rise under which none is possible',
      'levels',
      { 'guardrails.largestRise': { kind: 'fold', factor: 1.4 } },
      'guardrails.largestRise',
      /no rise is possible from 10 to the next dose, 20/,
    ],
    [
      'a fold from a dose of 0',
      'range',
      { scale: 'linear', 'doses.lowest': '0' },
      'guardrails.largestRise',
      /lowest dose above 0/,
    ],
    [
      'a fold of 1',
      'levels',
      { 'guardrails.largestRise': { kind: 'fold', factor: 1 } },
      'guardrails.largestRise.factor',
      /above 1/,
    ],
    [
      'ties up for a harm',
      'levels',
      { 'guardrails.ties': 'higher' },
      'guardrails.ties',
      /wanted response only/,
    ],
    [
      'ties up without reason',
      'levels',
      { 'guardrails.ties': 'higher', 'response.kind': 'wanted', 'guardrails.closing': null },
      'guardrails.tiesReason',
      /written reason/,
    ],
    [
      'no skipping on a range',
      'range',
      { 'guardrails.noSkipping': 'tried' },
      'guardrails.noSkipping',
      /for levels/,
    ],
    [
      'closing for a wanted response',
      'levels',
      { 'response.kind': 'wanted' },
      'guardrails.closing',
      /for a harm only/,
    ],
    ['a cutoff of 1', 'levels', { 'guardrails.closing.cutoff': 1 }, 'guardrails.closing.cutoff', /below 1/],
    [
      'a projection that leaves out the start',
      'levels',
      { 'guardrails.projection': { lowest: 3, highest: 5 } },
      'guardrails.projection',
      /outside the projection/,
    ],
    [
      'a rise that needs more than a cohort',
      'levels',
      { evaluableForRise: 4 },
      'evaluableForRise',
      /more than the cohort's 3/,
    ],
    [
      'fewer subjects than a cohort',
      'levels',
      { 'stopping.maximumSubjects': 2 },
      'stopping.maximumSubjects',
      /below the cohort size/,
    ],
    [
      'the interval of the last value on levels',
      'levels',
      { 'stopping.precision': { estimator: 'last-iterate', level: 0.8, width: 1, minimumSubjects: 5 } },
      'stopping.precision.estimator',
      /Robbins–Monro rule on a range/,
    ],
    [
      'a burn-in of everything',
      'levels',
      { finalEstimator: { name: 'polyak-ruppert', burnIn: 11 } },
      'finalEstimator.burnIn',
      /leaves none/,
    ],
    [
      'a window of 401 days',
      'levels',
      { 'observationWindow.length': 401 },
      'observationWindow.length',
      /at most 400/,
    ],
    ['another version of the shape', 'levels', { schemaVersion: 2 }, 'schemaVersion', /version 1/],
  ])('refuses %s', (_name, kind, changes, path, message) => {
    const found = refusals(changed(kind, changes));
    expect(Object.keys(found)).toContain(path);
    expect(found[path]).toMatch(message);
  });

  it.each([[null], [undefined], ['design'], [[]], [12]])('refuses %s as a whole', (input) => {
    expect(refusals(input)['']).toMatch(/The design is/);
  });

  it('says in every refusal what is wrong and what to do', () => {
    const found = refusals({
      schemaVersion: 9,
      response: {},
      doses: { kind: 'x' },
      guardrails: {},
      rule: {},
    });
    expect(Object.keys(found).length).toBeGreaterThan(15);
    for (const [path, message] of Object.entries(found)) {
      expect(message, path).toMatch(/^["A-Z].*\. .*(Enter|Choose|Fill|Remove|Say|Leave|[Pp]ut).*\.$/);
    }
  });

  it.each([
    'mg',
    'ug/kg/min',
    '[iU]/kg',
    '10*6.{cells}',
    '[CFU]',
    'mL',
    '%',
    'MBq',
    'mmol/L',
    'mg/m2',
    '{tbl}',
    'ug/(kg.h)'.replace(/[()]/g, ''),
  ])('takes the unit %s', (unit) => {
    expect(refusals(changed('levels', { unit }))).toEqual({});
  });

  it('refuses 5 MB of text and 10,000 levels in well under a second', () => {
    const began = performance.now();
    refusals(
      changed('levels', { startingDose: '1'.repeat(5_000_000), 'doses.levels': Array(10_000).fill('x') }),
    );
    expect(performance.now() - began).toBeLessThan(500);
  });
});
