import { designSchema, type Design, type DesignInput } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import type { CohortHistory, History } from '@/lib/design/history';

/** Guardrails of which none acts but rounding and projection. */
export const NO_GUARDRAILS: Design['guardrails'] = {
  largestRise: null,
  projection: null,
  ties: 'lower',
  tiesReason: null,
  noSkipping: 'off',
  coherence: 'off',
  closing: null,
};

/** Stopping at the maximum of cohorts only. */
export const NO_STOPPING: Design['stopping'] = { maximumSubjects: null, repeated: null, precision: null };

/** A validated design on linear levels 1 to 5 without guardrails and stopping, changed as asked. */
export function levelsDesign(changes: Partial<DesignInput> = {}): Design {
  return designSchema.parse({
    ...designDefaults('levels'),
    scale: 'linear',
    doses: { kind: 'levels', levels: ['1', '2', '3', '4', '5'] },
    startingDose: '2',
    maximumCohorts: 100,
    rule: { name: 'robbins-monro', c: 4, k0: 0, gamma: 1, carry: 'iterate' },
    guardrails: NO_GUARDRAILS,
    stopping: NO_STOPPING,
    ...changes,
  });
}

/** A validated wanted-response design on the linear grid 5, 5.5, …, 40 without guardrails and stopping. */
export function rangeDesign(changes: Partial<DesignInput> = {}): Design {
  const base = designDefaults('range');
  return designSchema.parse({
    ...base,
    response: { ...base.response, kind: 'wanted' },
    target: 0.9,
    unit: 'mL',
    scale: 'linear',
    doses: { kind: 'range', lowest: '5', highest: '40', increment: '0.5' },
    startingDose: '20',
    cohortSize: 2,
    evaluableForRise: 1,
    maximumCohorts: 100,
    rule: { name: 'joseph', slope: 0.25, priorSd: 6 },
    guardrails: NO_GUARDRAILS,
    stopping: NO_STOPPING,
    ...changes,
  });
}

/**
 * A cohort from its outcomes as 0 and 1, all given the released dose unless `given` says otherwise.
 *
 * @param outcomes one entry per evaluable subject. @param given doses really given, in the same order.
 */
export function cohort(
  number: number,
  released: string,
  outcomes: readonly number[],
  more: { given?: readonly string[]; lowered?: boolean } = {},
): CohortHistory {
  return {
    number,
    released,
    loweredRelease: more.lowered ?? false,
    subjects: outcomes.map((outcome, i) => ({
      given: more.given?.[i] ?? released,
      response: outcome === 1,
    })),
  };
}

/** A history from (released dose, outcomes) pairs. */
export function history(...cohorts: readonly (readonly [string, readonly number[]])[]): History {
  return { cohorts: cohorts.map(([released, outcomes], i) => cohort(i + 1, released, outcomes)) };
}
