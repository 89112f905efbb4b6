import { dosesBelow } from '@/lib/conduct/design-doses';
import { meaningOf } from '@/lib/conduct/decide/signing';
import type { RecommendationRecord } from '@/lib/conduct/recommendation-record';
import type { Outcome, RecommendationRow, Signature } from '@/lib/conduct/state';
import {
  awaitingRecommendation,
  currentCohort,
  placesOf,
  standingHalt,
  standingSignatures,
} from '@/lib/conduct/trial-facts';
import { compareDecimals, equalDecimals } from '@/lib/design/decimal';
import { doseText } from '@/lib/design/dose-text';
import type { TraceLine } from '@/lib/design/trace/line';
import type { Design } from '@/lib/schemas/design';
import { readerTrial, type ReaderTrial, type TrialReader } from './reader-trial';

/** A subject of the cohort under review, as its reviewers see it. */
export interface ReviewedSubject {
  readonly code: string;
  readonly site: string;
  readonly timeZone: string;
  readonly dosedAt: string | null;
  readonly doseGiven: string | null;
  readonly deviationReason: string | null;
  readonly outcome: Outcome | null;
  readonly onsetAt: string | null;
  /** Days from dosing to onset, the day of dosing being 0; null without an onset. */
  readonly onsetDay: number | null;
  readonly windowEndsAt: string | null;
}

/** A standing signature. */
export interface StandingSignature {
  readonly printedName: string;
  readonly decision: Signature['decision'];
  readonly dose: string | null;
  readonly reason: string | null;
  readonly meaning: string;
  readonly signedAt: string;
}

/** A decision a signer may choose, with the consequence and the sentence they state by it. */
export interface DecisionChoice {
  readonly decision: 'release' | 'return' | 'stop';
  readonly dose: string | null;
  readonly isLower: boolean;
  readonly meaning: string;
  /** How many signatures stand on it already, the reader's own left out. */
  readonly standing: number;
}

/** The packet: all a reviewer needs to judge the step. */
export interface PacketView {
  readonly recommendationId: string;
  readonly digest: string;
  readonly number: number;
  readonly revision: number;
  readonly outcome: 'dose' | 'stop';
  readonly dose: string | null;
  readonly closedFrom: string | null;
  /** The dose of the cohort under review; null for the starting dose. */
  readonly currentDose: string | null;
  readonly design: Design;
  readonly designVersion: number;
  readonly softwareVersion: string;
  readonly computedAt: string;
  readonly subjects: readonly ReviewedSubject[];
  readonly lines: readonly TraceLine[];
  readonly history: RecommendationRecord['history'];
  readonly choices: readonly DecisionChoice[];
  readonly signatures: readonly StandingSignature[];
  /** The reader's own standing decision, or null. */
  readonly own: StandingSignature | null;
  /** Present for those whose role signs; `why` says why this person may not. */
  readonly sign: { readonly why: string | null } | null;
}

/** A halt that waits to be lifted. */
export interface LiftView {
  readonly haltId: string;
  readonly reason: string;
  readonly haltedAt: string;
  readonly haltedBy: string | null;
  /** The open cohort the plan is for; null when none is open. */
  readonly cohortNumber: number | null;
  readonly signatures: readonly StandingSignature[];
  /** Signatures of others that stand on each plan, the reader's own left out. */
  readonly standing: Readonly<Record<'continue' | 'close-short', number>>;
  readonly sign: { readonly why: string | null } | null;
}

/** The review page of a trial. */
export interface ReviewView {
  readonly trialCode: string;
  readonly quorum: number;
  readonly packet: PacketView | null;
  readonly lift: LiftView | null;
  /** What is going on when nothing waits for signatures. */
  readonly idle: string | null;
  /** The last dose released, with the signatures that released it; null before the first. */
  readonly lastRelease: LastRelease | null;
}

/** A release and who signed it. */
export interface LastRelease {
  readonly cohortNumber: number;
  readonly dose: string;
  readonly releasedAt: string;
  readonly signatures: readonly StandingSignature[];
}

function standing(signature: Signature): StandingSignature {
  const { printedName, decision, dose, reason, meaning, signedAt } = signature;
  return { printedName, decision, dose, reason, meaning, signedAt };
}

const DAY = 86_400_000;

function subjectsUnderReview(trial: ReaderTrial): ReviewedSubject[] {
  const { state, sites } = trial.loaded;
  const cohort = currentCohort(state);
  if (cohort === null || cohort.state !== 'under-review') return [];
  return placesOf(state, cohort.id).map((subject) => ({
    code: subject.code,
    site: sites[subject.siteId]?.name ?? '',
    timeZone: sites[subject.siteId]?.timeZone ?? 'UTC',
    dosedAt: subject.dosedAt,
    doseGiven: subject.doseGiven,
    deviationReason: subject.deviationReason,
    outcome: subject.outcome,
    onsetAt: subject.onsetAt,
    onsetDay:
      subject.onsetAt && subject.dosedAt
        ? Math.floor((Date.parse(subject.onsetAt) - Date.parse(subject.dosedAt)) / DAY)
        : null,
    windowEndsAt: subject.windowEndsAt,
  }));
}

/** What may be decided on a recommendation: release it, repeat or lower the dose, return, stop; never above it. */
function choicesOn(
  trialCode: string,
  design: Design,
  recommendation: RecommendationRow,
  others: readonly Signature[],
): DecisionChoice[] {
  const { dose, closedFrom } = recommendation;
  const releasable =
    dose === null
      ? []
      : [
          dose,
          ...dosesBelow(design.doses, dose).filter(
            (lower) => closedFrom === null || compareDecimals(lower, closedFrom) < 0,
          ),
        ];
  const choice = (decision: DecisionChoice['decision'], chosen: string | null): DecisionChoice => ({
    decision,
    dose: chosen,
    isLower: chosen !== null && dose !== null && !equalDecimals(chosen, dose),
    meaning: meaningOf(trialCode, design, recommendation, decision, chosen),
    standing: others.filter(
      (signature) =>
        signature.decision === decision &&
        (chosen === null || (signature.dose !== null && equalDecimals(signature.dose, chosen))),
    ).length,
  });
  return [...releasable.map((each) => choice('release', each)), choice('return', null), choice('stop', null)];
}

function packetOf(trial: ReaderTrial, readerId: string): PacketView | null {
  const { state } = trial.loaded;
  const recommendation = awaitingRecommendation(state);
  const version = recommendation && state.designVersions[recommendation.designVersionId];
  if (!recommendation || !version) return null;
  const record = JSON.parse(recommendation.record) as RecommendationRecord;
  const signatures = standingSignatures(state, recommendation.id);
  const others = signatures.filter((signature) => signature.personId !== readerId);
  const own = signatures.find((signature) => signature.personId === readerId);
  return {
    recommendationId: recommendation.id,
    digest: recommendation.digest,
    number: recommendation.number,
    revision: recommendation.revision,
    outcome: recommendation.outcome,
    dose: recommendation.dose,
    closedFrom: recommendation.closedFrom,
    currentDose: currentCohort(state)?.dose ?? null,
    design: version.design,
    designVersion: version.number,
    softwareVersion: recommendation.softwareVersion,
    computedAt: recommendation.computedAt,
    subjects: subjectsUnderReview(trial),
    lines: record.result.lines,
    history: record.history,
    choices: choicesOn(state.trial.code, version.design, recommendation, others),
    signatures: signatures.map(standing),
    own: own ? standing(own) : null,
    sign: trial.offers.signRecommendation ?? null,
  };
}

function liftOf(trial: ReaderTrial, readerId: string): LiftView | null {
  const { state, people } = trial.loaded;
  const halt = standingHalt(state);
  if (halt === null) return null;
  const cohort = currentCohort(state);
  const signatures = standingSignatures(state, halt.id);
  const othersOn = (plan: 'continue' | 'close-short') =>
    signatures.filter((each) => each.personId !== readerId && each.decision === plan).length;
  return {
    haltId: halt.id,
    reason: halt.reason,
    haltedAt: halt.haltedAt,
    haltedBy: halt.haltedBy ? (people[halt.haltedBy]?.printedName ?? null) : null,
    cohortNumber: cohort?.state === 'open' && !cohort.isRecordsOnly ? cohort.number : null,
    signatures: signatures.map(standing),
    standing: { continue: othersOn('continue'), 'close-short': othersOn('close-short') },
    sign: trial.offers.lift ?? null,
  };
}

function lastReleaseOf(trial: ReaderTrial): LastRelease | null {
  const { state } = trial.loaded;
  const release = Object.values(state.releases).sort((a, b) => b.cohortNumber - a.cohortNumber)[0];
  const recommendation = release && state.recommendations[release.recommendationId];
  const version = recommendation && state.designVersions[recommendation.designVersionId];
  if (!release || !version) return null;
  return {
    cohortNumber: release.cohortNumber,
    dose: doseText(version.design, release.dose),
    releasedAt: release.releasedAt,
    signatures: standingSignatures(state, release.recommendationId).map(standing),
  };
}

function idleOf(trial: ReaderTrial): string {
  const { state } = trial.loaded;
  const cohort = currentCohort(state);
  if (state.trial.state === 'draft') return 'The design is being written. Nothing waits for signatures.';
  if (state.trial.state === 'in-review') return 'The design waits for approval, on its own page.';
  if (state.trial.state === 'closed')
    return 'The trial is closed to enrolment. Nothing waits for signatures.';
  if (cohort?.isRecordsOnly) {
    return `Cohort ${cohort.number} was returned. It comes back here when its sites have resubmitted it.`;
  }
  if (cohort) {
    const missing = cohort.size - placesOf(state, cohort.id).filter((each) => each.outcome !== null).length;
    const version = state.designVersions[cohort.designVersionId];
    const dose = version ? doseText(version.design, cohort.dose) : cohort.dose;
    return `Cohort ${cohort.number} is open at ${dose}; ${missing === 1 ? 'one outcome is' : `${missing} outcomes are`} still to come.`;
  }
  return 'Nothing waits for signatures.';
}

/** The review page for a reader, or null when the trial or the page is not theirs. */
export async function reviewPage(reader: TrialReader, code: string): Promise<ReviewView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('recommendation.read')) return null;
  const { state } = trial.loaded;
  const packet = packetOf(trial, reader.personId);
  const lift = liftOf(trial, reader.personId);
  return {
    trialCode: state.trial.code,
    quorum: state.trial.quorum,
    packet,
    lift,
    idle: packet === null && lift === null ? idleOf(trial) : null,
    lastRelease: lastReleaseOf(trial),
  };
}
