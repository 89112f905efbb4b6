import { DESIGN_SCHEMA_VERSION, type Design } from './design';

/**
 * A sensible design to start from, to be completed and changed by a person: virtual observations on levels,
 * Robbins & Monro on a range. It is valid as it stands. The doses are placeholders of the right kind.
 */
export function designDefaults(kind: Design['doses']['kind']): Design {
  return kind === 'levels' ? levelsDefaults() : rangeDefaults();
}

function commonDefaults() {
  return {
    schemaVersion: DESIGN_SCHEMA_VERSION,
    response: {
      present: 'dose-limiting toxicity',
      absent: 'none',
      kind: 'harm',
      direction: 'rising',
    },
    target: 0.25,
    unit: 'mg',
    doseNotation: 'plain',
    cohortSize: 3,
    maximumCohorts: 10,
    evaluableForRise: 3,
    replacements: 3,
    stopping: { maximumSubjects: 30, repeated: null, precision: null },
    pending: 'wait',
    observationWindow: { length: 28, unit: 'days' },
  } as const;
}

function levelsDefaults(): Design {
  return {
    ...commonDefaults(),
    doses: { kind: 'levels', levels: ['10', '20', '40', '60', '90', '120'] },
    scale: 'log',
    startingDose: '10',
    rule: { name: 'virtual-observations', slope: 0.25, carryBounds: null },
    guardrails: {
      largestRise: { kind: 'fold', factor: 2 },
      projection: null,
      ties: 'lower',
      tiesReason: null,
      noSkipping: 'tried',
      coherence: 'one-way',
      closing: { priorA: 1, priorB: 1, cutoff: 0.95, minimumEvaluable: 3, scope: 'every-level' },
    },
    finalEstimator: { name: 'centred-isotonic', intervalLevel: 0.95 },
  };
}

function rangeDefaults(): Design {
  return {
    ...commonDefaults(),
    doses: { kind: 'range', lowest: '10', highest: '120', increment: '1' },
    scale: 'log',
    startingDose: '10',
    rule: { name: 'robbins-monro', c: 4, k0: 0, gamma: 1, carry: 'iterate', carryReason: null },
    guardrails: {
      largestRise: { kind: 'fold', factor: 2 },
      projection: null,
      ties: 'lower',
      tiesReason: null,
      noSkipping: 'off',
      coherence: 'one-way',
      closing: { priorA: 1, priorB: 1, cutoff: 0.95, minimumEvaluable: 3, scope: 'every-level' },
    },
    finalEstimator: { name: 'logit', firth: true, interval: 'fieller', intervalLevel: 0.95 },
  };
}
