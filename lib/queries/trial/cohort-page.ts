import { whyNoNewSubject } from '@/lib/conduct/decide/slots';
import type { Cohort, DesignVersion, Outcome, Subject } from '@/lib/conduct/state';
import { cohortsInOrder, placesOf, revisionsOf } from '@/lib/conduct/trial-facts';
import { equalDecimals } from '@/lib/design/decimal';
import { doseText } from '@/lib/design/dose-text';
import { sha256 } from '@/lib/hash';
import { unitText } from '@/lib/schemas/units';
import type { SiteEntry } from '../load-trial-state';
import { type CohortStanding, cohortStanding, whatFollows } from './cohort-words';
import { type ReaderTrial, readerTrial, type TrialReader } from './reader-trial';

/** A subject's record in a cohort, as those read it who may. */
export interface SubjectRecord {
  readonly id: string;
  readonly code: string;
  readonly site: { readonly name: string; readonly timeZone: string };
  readonly state: Subject['state'];
  /** Counts the changes of the record; a correction names the one it saw. */
  readonly revision: number;
  readonly reservedAt: string;
  readonly dosedAt: string | null;
  readonly doseGiven: string | null;
  readonly isDeviation: boolean;
  readonly deviationReason: string | null;
  readonly windowEndsAt: string | null;
  readonly outcome: Outcome | null;
  readonly onsetAt: string | null;
}

/** An act on a record; `why` says why it is not possible now. */
interface Act {
  readonly why: string | null;
}

/** A record of the reader's own site, with what they may do to it. */
export interface OwnSubject extends SubjectRecord {
  readonly acts: {
    readonly releaseSlot?: Act;
    readonly recordDosing?: Act;
    readonly recordPresent?: Act;
    readonly recordAbsent?: Act;
    readonly correctOutcome?: Act;
  };
}

/** A place of a cohort as a site sees it: its own subject, somebody else's, or free. */
export type CohortPlace =
  | { readonly place: number; readonly holder: 'own'; readonly subject: OwnSubject }
  | { readonly place: number; readonly holder: 'another-site' }
  | { readonly place: number; readonly holder: 'nobody' };

/** A reservation that was given back. */
export interface GivenBack {
  readonly id: string;
  readonly code: string;
  readonly siteName: string;
  readonly reason: string | null;
}

interface CohortFacts {
  readonly trialCode: string;
  readonly cohort: {
    readonly id: string;
    readonly number: number;
    readonly size: number;
    readonly placesTaken: number;
    readonly standing: CohortStanding;
    readonly openedAt: string;
    readonly completedAt: string | null;
    readonly hasPrevious: boolean;
    readonly hasNext: boolean;
  };
  readonly dose: {
    /** The exact released dose, its unit, and both as they are read. */
    readonly value: string;
    readonly unit: string;
    readonly text: string;
    readonly releasedAt: string;
    readonly signers: readonly string[];
    readonly designVersion: number;
    /** What was recommended, where the release is lower and the reader may know. */
    readonly recommendedText: string | null;
  };
  /** Why nobody may be dosed at this dose now (at the reader's site, where they have one); null while subjects may. */
  readonly notForDosing: string | null;
  readonly labels: { readonly present: string; readonly absent: string };
  readonly window: { readonly length: number; readonly unit: 'days' | 'hours' };
  /** The questions the reviewers returned the cohort with, while it is open for them. */
  readonly questions: readonly string[];
  readonly follows: string;
  readonly givenBack: readonly GivenBack[];
}

interface SiteReading {
  readonly reads: 'own-sites';
  readonly places: readonly CohortPlace[];
}

interface FullReading {
  readonly reads: 'all';
  readonly subjects: readonly (SubjectRecord & { readonly place: number })[];
  readonly freePlaces: number;
}

/** The page of one cohort, cut to what its reader may see. */
export type CohortPageView = CohortFacts & {
  /** The time the page was made at. */
  readonly readAt: string;
  /** The zone of the reader's first site, UTC for the others. */
  readonly zone: string;
  /** A digest of all that this reader is shown of the cohort; it changes when any of that does. */
  readonly revision: string;
} & (
    | (SiteReading & {
        readonly reserve: {
          readonly sites: readonly { readonly id: string; readonly name: string; readonly code: string }[];
          readonly why: string | null;
        } | null;
        readonly resubmit: Act | null;
      })
    | FullReading
  );

function siteOf(trial: ReaderTrial, siteId: string): SiteEntry {
  const site = trial.loaded.sites[siteId];
  if (!site) throw new Error(`Site ${siteId} is not of the trial.`);
  return site;
}

function recordOf(trial: ReaderTrial, cohort: Cohort, subject: Subject): SubjectRecord {
  const { name, timeZone } = siteOf(trial, subject.siteId);
  const { id, code, state, revision, reservedAt, dosedAt, doseGiven, deviationReason } = subject;
  const { windowEndsAt, outcome, onsetAt } = subject;
  return {
    id,
    code,
    site: { name, timeZone },
    state,
    revision,
    reservedAt,
    dosedAt,
    doseGiven,
    isDeviation: doseGiven !== null && !equalDecimals(doseGiven, cohort.dose),
    deviationReason,
    windowEndsAt,
    outcome,
    onsetAt,
  };
}

function doseOf(trial: ReaderTrial, cohort: Cohort, version: DesignVersion): CohortFacts['dose'] {
  const { state } = trial.loaded;
  const release = state.releases[cohort.releaseId];
  if (!release) throw new Error(`Cohort ${cohort.id} has no release.`);
  const signers = Object.values(state.signatures)
    .filter(
      (signature) =>
        signature.isStanding &&
        signature.recommendationId === release.recommendationId &&
        signature.decision === 'release' &&
        signature.dose !== null &&
        equalDecimals(signature.dose, release.dose),
    )
    .sort((a, b) => a.signedAt.localeCompare(b.signedAt))
    .map((signature) => signature.printedName);
  const isLower = !equalDecimals(release.dose, release.recommendedDose);
  return {
    value: cohort.dose,
    unit: unitText(version.design.unit),
    text: doseText(version.design, cohort.dose),
    releasedAt: release.releasedAt,
    signers,
    designVersion: version.number,
    recommendedText:
      isLower && trial.may('recommendation.read') ? doseText(version.design, release.recommendedDose) : null,
  };
}

/** The reasons of the last return of what followed from a cohort, while the cohort is open for answers. */
function questionsOf(trial: ReaderTrial, cohort: Cohort): string[] {
  if (cohort.state !== 'open' || !cohort.isRecordsOnly) return [];
  const { state } = trial.loaded;
  const returned = revisionsOf(state, cohort.number + 1)
    .filter((row) => row.state === 'returned')
    .at(-1);
  return Object.values(state.signatures)
    .filter((each) => each.recommendationId === returned?.id && each.decision === 'return')
    .flatMap((each) => each.reason ?? []);
}

/** The reader's own site, or for those without one any site that is active. */
function siteAskedAbout(trial: ReaderTrial): string {
  const active = Object.values(trial.loaded.state.sites).find((site) => site.state === 'active');
  return trial.siteIds[0] ?? active?.siteId ?? '';
}

function factsOf(trial: ReaderTrial, cohort: Cohort, isOwn: (subject: Subject) => boolean): CohortFacts {
  const { state } = trial.loaded;
  const version = state.designVersions[cohort.designVersionId];
  if (!version) throw new Error(`Cohort ${cohort.id} has no design version.`);
  const numbers = cohortsInOrder(state).map(({ number }) => number);
  const { present, absent } = version.design.response;
  return {
    trialCode: state.trial.code,
    cohort: {
      id: cohort.id,
      number: cohort.number,
      size: cohort.size,
      placesTaken: placesOf(state, cohort.id).length,
      standing: cohortStanding(cohort),
      openedAt: cohort.openedAt,
      completedAt: cohort.completedAt,
      hasPrevious: numbers.includes(cohort.number - 1),
      hasNext: numbers.includes(cohort.number + 1),
    },
    dose: doseOf(trial, cohort, version),
    notForDosing: whyNoNewSubject(state, cohort, siteAskedAbout(trial)),
    labels: { present, absent },
    window: version.design.observationWindow,
    questions: questionsOf(trial, cohort),
    follows: whatFollows(state, cohort),
    givenBack: Object.values(state.subjects)
      .filter((subject) => subject.cohortId === cohort.id && subject.place === null && isOwn(subject))
      .sort((a, b) => a.reservedAt.localeCompare(b.reservedAt) || a.id.localeCompare(b.id))
      .map(({ id, code, siteId, releaseReason }) => ({
        id,
        code,
        siteName: siteOf(trial, siteId).name,
        reason: releaseReason,
      })),
  };
}

function placesFor(trial: ReaderTrial, cohort: Cohort, isOwn: (subject: Subject) => boolean): CohortPlace[] {
  const taken = new Map(placesOf(trial.loaded.state, cohort.id).map((subject) => [subject.place, subject]));
  return Array.from({ length: cohort.size }, (_, index): CohortPlace => {
    const place = index + 1;
    const subject = taken.get(place);
    if (!subject) return { place, holder: 'nobody' };
    if (!isOwn(subject)) return { place, holder: 'another-site' };
    return {
      place,
      holder: 'own',
      subject: { ...recordOf(trial, cohort, subject), acts: trial.offers.subjects[subject.id] ?? {} },
    };
  });
}

function reserveOf(trial: ReaderTrial, cohort: Cohort) {
  const offered = trial.siteIds.filter((siteId) => trial.offers.reserveSlot[siteId]);
  if (cohort.state !== 'open' || cohort.isRecordsOnly || offered.length === 0) return null;
  const possible = offered.filter((siteId) => trial.offers.reserveSlot[siteId]?.why === null);
  return {
    sites: (possible.length > 0 ? possible : offered)
      .map((siteId) => siteOf(trial, siteId))
      .map(({ siteId, name, code }) => ({ id: siteId, name, code }))
      .sort((a, b) => a.name.localeCompare(b.name)),
    why: possible.length > 0 ? null : (trial.offers.reserveSlot[offered[0] ?? '']?.why ?? null),
  };
}

/** A digest of what is shown; acts depend on the hour as well and are left out. */
function revisionOf(shown: CohortFacts & (SiteReading | FullReading)): string {
  return sha256(JSON.stringify(shown, (key, value: unknown) => (key === 'acts' ? undefined : value)));
}

/**
 * The page of a cohort for a reader, or null when the trial, its cohorts or a cohort of this number are not theirs.
 * Site roles get their own sites' records only: of other sites' places, that they are taken.
 * @param number the cohort's number as it stands in the address
 */
export async function cohortPage(
  reader: TrialReader,
  code: string,
  number: string,
): Promise<CohortPageView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('cohort.read') || !/^[1-9]\d{0,5}$/.test(number)) return null;
  const { state, sites } = trial.loaded;
  const cohort = cohortsInOrder(state).find((each) => each.number === Number(number));
  if (!cohort) return null;
  const seesAll = trial.may('subject.read-all');
  const isOwn = (subject: Subject) => seesAll || trial.siteIds.includes(subject.siteId);
  const facts = factsOf(trial, cohort, isOwn);
  const zone = seesAll ? 'UTC' : (sites[trial.siteIds[0] ?? '']?.timeZone ?? 'UTC');
  if (seesAll) {
    const subjects = placesOf(state, cohort.id).map((subject) => ({
      ...recordOf(trial, cohort, subject),
      place: subject.place ?? 0,
    }));
    const freePlaces = cohort.state === 'open' && !cohort.isClosedShort ? cohort.size - subjects.length : 0;
    const shown = { ...facts, reads: 'all' as const, subjects, freePlaces };
    return { ...shown, readAt: trial.now, zone, revision: revisionOf(shown) };
  }
  const shown = {
    ...facts,
    reads: 'own-sites' as const,
    places: placesFor(trial, cohort, isOwn),
  };
  return {
    ...shown,
    readAt: trial.now,
    zone,
    revision: revisionOf(shown),
    reserve: reserveOf(trial, cohort),
    resubmit: cohort.state === 'open' && cohort.isRecordsOnly ? (trial.offers.resubmitCohort ?? null) : null,
  };
}
