import { canonicalize } from 'json-canonicalize';
import type { CohortHistory } from '@/lib/design/history';
import { recommend, type Recommendation } from '@/lib/design/recommend';
import type { Design } from '@/lib/schemas/design';
import type { Deciding } from './decision';
import type { DesignVersion, TrialState } from './state';
import { cohortsInOrder, placesOf, revisionsOf } from './trial-facts';

/** Everything a recommendation was computed from and every figure of it: the stored text is this, canonical. */
export interface RecommendationRecord {
  readonly format: 'stepwell recommendation record 1';
  readonly trial: { readonly id: string; readonly code: string };
  readonly number: number;
  readonly revision: number;
  readonly designVersion: { readonly number: number; readonly digest: string; readonly design: Design };
  readonly history: readonly CohortHistory[];
  readonly result: Recommendation;
  readonly softwareVersion: string;
  readonly computedAt: string;
}

/**
 * The trial's history as the mathematics takes it: every cohort with all its outcomes, its released dose, the stored
 * mark of a lowered release, and its evaluable subjects by place with the dose really given.
 */
export function historyOf(state: TrialState): CohortHistory[] {
  return cohortsInOrder(state)
    .filter((cohort) => cohort.state === 'signed' || cohort.state === 'under-review')
    .map((cohort) => {
      const release = state.releases[cohort.releaseId];
      return {
        number: cohort.number,
        released: cohort.dose,
        loweredRelease: release !== undefined && release.dose !== release.recommendedDose,
        subjects: placesOf(state, cohort.id)
          .filter((subject) => subject.outcome === 'present' || subject.outcome === 'absent')
          .map((subject) => ({
            given: subject.doseGiven ?? cohort.dose,
            response: subject.outcome === 'present',
          })),
      };
    });
}

/**
 * Computes the recommendation for a cohort number from the state (steps 1–8 of the method only) and adds it as a new
 * revision awaiting signatures. Throws when the computation fails, so that nothing is stored on a wrong figure.
 */
export function computeRecommendation(deciding: Deciding, version: DesignVersion, number: number): void {
  const { state, context } = deciding;
  const history = historyOf(state);
  const result = recommend(version.design, { cohorts: history });
  if (!result.ok) throw new Error(`No recommendation could be computed: ${JSON.stringify(result.error)}`);
  const revision = revisionsOf(state, number).length + 1;
  const recommendation = result.value;
  const record: RecommendationRecord = {
    format: 'stepwell recommendation record 1',
    trial: { id: state.trial.id, code: state.trial.code },
    number,
    revision,
    designVersion: { number: version.number, digest: version.digest, design: version.design },
    history,
    result: recommendation,
    softwareVersion: context.softwareVersion,
    computedAt: context.now,
  };
  const text = canonicalize(record);
  deciding.emit({
    kind: 'recommendation-computed',
    recommendationId: context.newId(),
    number,
    revision,
    designVersionId: version.id,
    outcome: recommendation.kind,
    dose: recommendation.kind === 'dose' ? recommendation.dose : null,
    closedFrom: recommendation.closedFrom,
    record: text,
    digest: context.sha256(text),
    softwareVersion: context.softwareVersion,
  });
}
