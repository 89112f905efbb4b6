import { cohortsInOrder, versionInForce } from '@/lib/conduct/trial-facts';
import type { TrialState } from '@/lib/conduct/state';
import type { Design } from '@/lib/schemas/design';
import { type ProportionAtDose, proportionsByDose } from './proportions-by-dose';
import { readerTrial, type TrialReader } from './reader-trial';

/** Counts of subjects below this are not told one by one, so that no subject can be made out behind them. */
export const SMALL_COUNT = 3;

/** A count as told in the summary: the number, or null where it is small and above zero. */
export type ToldCount = number | null;

/** The summary of a trial: signed doses and aggregates, never a subject's row, a trace or an unsigned dose. */
export interface SummaryView {
  readonly code: string;
  readonly title: string;
  readonly state: string;
  readonly design: Pick<
    Design,
    'response' | 'target' | 'unit' | 'scale' | 'doseNotation' | 'cohortSize' | 'maximumCohorts'
  > | null;
  readonly cohorts: readonly {
    readonly number: number;
    readonly dose: string;
    readonly state: string;
    readonly releasedAt: string;
  }[];
  readonly signedCohorts: number;
  readonly enrolled: ToldCount;
  /** From signed cohorts only; a dose with fewer evaluable subjects than the small count is left out. */
  readonly proportions: readonly ProportionAtDose[];
  readonly dosesLeftOut: number;
  readonly sites: readonly { readonly code: string; readonly name: string; readonly enrolled: ToldCount }[];
  /** Days from the release of a dose to the outcome of the cohort's last subject, over signed cohorts; null before any. */
  readonly meanCohortDays: number | null;
}

const told = (count: number): ToldCount => (count > 0 && count < SMALL_COUNT ? null : count);

function enrolmentBySite(state: TrialState): Map<string, number> {
  const enrolled = new Map<string, number>();
  for (const subject of Object.values(state.subjects)) {
    if (subject.dosedAt === null) continue;
    enrolled.set(subject.siteId, (enrolled.get(subject.siteId) ?? 0) + 1);
  }
  return enrolled;
}

/** Counts by site as told: where exactly one would be left out, the next smallest is left out with it. */
export function toldCounts(counts: readonly number[]): ToldCount[] {
  const first = counts.map(told);
  if (first.filter((count) => count === null).length !== 1) return first;
  const shown = first.flatMap((count, index) => (count === null || count === 0 ? [] : [{ count, index }]));
  const smallest = shown.sort((a, b) => a.count - b.count)[0];
  return first.map((count, index) => (index === smallest?.index ? null : count));
}

/** The summary of a trial for a reader, or null when the trial or the page is not theirs. */
export async function summaryPage(reader: TrialReader, code: string): Promise<SummaryView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('summary.read')) return null;
  const { state, sites } = trial.loaded;
  const version = versionInForce(state);
  const cohorts = cohortsInOrder(state);
  const signed = cohorts.filter((cohort) => cohort.state === 'signed');
  const all = proportionsByDose(state, signed);
  const proportions = all.filter((each) => each.evaluable >= SMALL_COUNT);
  const bySite = enrolmentBySite(state);
  const siteIds = Object.keys(state.sites).sort((a, b) =>
    (sites[a]?.code ?? '').localeCompare(sites[b]?.code ?? ''),
  );
  const siteCounts = toldCounts(siteIds.map((siteId) => bySite.get(siteId) ?? 0));
  const durations = signed.flatMap((cohort) =>
    cohort.completedAt ? [(Date.parse(cohort.completedAt) - Date.parse(cohort.openedAt)) / 86_400_000] : [],
  );
  const design = version?.design;
  return {
    code: state.trial.code,
    title: state.trial.title,
    state: state.trial.state,
    design: design
      ? {
          response: design.response,
          target: design.target,
          unit: design.unit,
          scale: design.scale,
          doseNotation: design.doseNotation,
          cohortSize: design.cohortSize,
          maximumCohorts: design.maximumCohorts,
        }
      : null,
    cohorts: cohorts.map((cohort) => ({
      number: cohort.number,
      dose: cohort.dose,
      state: cohort.state,
      releasedAt: cohort.openedAt,
    })),
    signedCohorts: signed.length,
    enrolled: told([...bySite.values()].reduce((sum, count) => sum + count, 0)),
    proportions,
    dosesLeftOut: all.length - proportions.length,
    sites: siteIds.map((siteId, index) => ({
      code: sites[siteId]?.code ?? '',
      name: sites[siteId]?.name ?? '',
      enrolled: siteCounts[index] ?? null,
    })),
    meanCohortDays:
      durations.length === 0 ? null : durations.reduce((sum, days) => sum + days, 0) / durations.length,
  };
}
