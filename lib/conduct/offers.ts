import { roleMay } from '@/lib/policy/trial-permissions';
import type { TrialRole } from '@/lib/policy/roles';
import { whyNotSubmit } from './decide/design';
import { whyNoNewSubject } from './decide/slots';
import { whyMayNotSign } from './permitted';
import type { Instant, Subject, TrialState } from './state';
import {
  awaitingRecommendation,
  currentCohort,
  draftVersion,
  isComplete,
  lowestFreePlace,
  placesOf,
  standingHalt,
  submittedVersion,
} from './trial-facts';

/** An act a page may show. `why` is the sentence that says why it is not possible now; null when it is. */
export interface Offer {
  readonly why: string | null;
}

/** Acts on one subject's record; absent where they make no sense in its state. */
export interface SubjectOffers {
  readonly releaseSlot?: Offer;
  readonly recordDosing?: Offer;
  readonly recordPresent?: Offer;
  readonly recordAbsent?: Offer;
  readonly correctOutcome?: Offer;
}

/** The acts of one person in a trial as it stands; absent acts are not for their role or not of this moment. */
export interface Offers {
  readonly halt?: Offer;
  readonly lift?: Offer;
  readonly saveDesign?: Offer;
  readonly submitDesign?: Offer;
  readonly returnDesign?: Offer;
  readonly approveDesign?: Offer;
  readonly signRecommendation?: Offer;
  /** By site of the person. */
  readonly reserveSlot: Readonly<Record<string, Offer>>;
  readonly resubmitCohort?: Offer;
  /** By subject of the person's sites. */
  readonly subjects: Readonly<Record<string, SubjectOffers>>;
}

const open: Offer = { why: null };

function subjectOffers(state: TrialState, subject: Subject, now: Instant): SubjectOffers {
  const cohort = state.cohorts[subject.cohortId];
  if (!cohort) return {};
  if (subject.state === 'reserved') {
    return { releaseSlot: open, recordDosing: { why: whyNoNewSubject(state, cohort, subject.siteId) } };
  }
  if (subject.state === 'dosed') {
    const isEarly = subject.windowEndsAt !== null && now < subject.windowEndsAt;
    return {
      recordPresent: open,
      recordAbsent: { why: isEarly ? 'The observation window has not ended.' : null },
    };
  }
  if (subject.state === 'complete' && (cohort.state === 'open' || cohort.state === 'under-review')) {
    return { correctOutcome: open };
  }
  return {};
}

function siteOffers(
  state: TrialState,
  siteIds: readonly string[],
  now: Instant,
): Pick<Offers, 'reserveSlot' | 'resubmitCohort' | 'subjects'> {
  const cohort = currentCohort(state);
  const reserveSlot: Record<string, Offer> = {};
  if (cohort?.state === 'open' && !cohort.isRecordsOnly) {
    const isFull = lowestFreePlace(state, cohort) === null;
    for (const siteId of siteIds) {
      reserveSlot[siteId] = {
        why:
          whyNoNewSubject(state, cohort, siteId) ?? (isFull ? 'All places of the cohort are taken.' : null),
      };
    }
  }
  const subjects: Record<string, SubjectOffers> = {};
  for (const subject of Object.values(state.subjects)) {
    if (siteIds.includes(subject.siteId)) subjects[subject.id] = subjectOffers(state, subject, now);
  }
  const mayResubmit =
    cohort?.isRecordsOnly && placesOf(state, cohort.id).some((subject) => siteIds.includes(subject.siteId));
  if (!cohort || !mayResubmit) return { reserveSlot, subjects };
  const why =
    state.trial.state === 'halted'
      ? 'The trial is halted.'
      : isComplete(state, cohort)
        ? null
        : 'An outcome of the cohort is still missing.';
  return { reserveSlot, subjects, resubmitCohort: { why } };
}

/**
 * The acts a person is offered in a trial, and why one is not possible now: the same rules `decide` refuses by.
 * @param actor the person with their standing role and sites in the trial
 */
export function offersFor(
  state: TrialState,
  actor: { readonly personId: string; readonly role: TrialRole; readonly siteIds: readonly string[] },
  now: Instant,
): Offers {
  const { role } = actor;
  const life = state.trial.state;
  const draft = draftVersion(state);
  const submitted = submittedVersion(state);
  const mayNotSign = { why: whyMayNotSign(state, actor.personId) };
  const ofSites = roleMay(role, 'subject.record')
    ? siteOffers(state, actor.siteIds, now)
    : { reserveSlot: {}, subjects: {} };
  return {
    ...ofSites,
    ...(roleMay(role, 'trial.halt') && life === 'open' ? { halt: open } : {}),
    ...(roleMay(role, 'trial.lift') && standingHalt(state) ? { lift: mayNotSign } : {}),
    ...(roleMay(role, 'design.write') && life === 'draft' ? { saveDesign: open } : {}),
    ...(roleMay(role, 'design.write') && draft && life === 'draft'
      ? { submitDesign: { why: whyNotSubmit({ state }) } }
      : {}),
    ...(roleMay(role, 'design.approve') && submitted
      ? { returnDesign: open, approveDesign: mayNotSign }
      : {}),
    ...(roleMay(role, 'recommendation.sign') && awaitingRecommendation(state) && life !== 'halted'
      ? { signRecommendation: mayNotSign }
      : {}),
  };
}
