import type {
  Cohort,
  DesignVersion,
  Halt,
  Member,
  RecommendationRow,
  Signature,
  Subject,
  TrialState,
} from './state';

/** Facts read off a trial's state; every decision and page asks these, so that none is worded twice. */

const values = <T>(byId: Readonly<Record<string, T>>): T[] => Object.values(byId);

/** All cohorts, by number. */
export function cohortsInOrder(state: TrialState): Cohort[] {
  return values(state.cohorts).sort((a, b) => a.number - b.number);
}

/** The cohort that is open or under review, or null. */
export function currentCohort(state: TrialState): Cohort | null {
  return (
    values(state.cohorts).find((cohort) => cohort.state === 'open' || cohort.state === 'under-review') ?? null
  );
}

/** Subjects holding a place in a cohort, by place. */
export function placesOf(state: TrialState, cohortId: string): Subject[] {
  return values(state.subjects)
    .filter((subject) => subject.cohortId === cohortId && subject.place !== null)
    .sort((a, b) => (a.place ?? 0) - (b.place ?? 0));
}

/** The lowest place of a cohort nobody holds, or null when it is full or closed short. */
export function lowestFreePlace(state: TrialState, cohort: Cohort): number | null {
  if (cohort.isClosedShort) return null;
  const taken = new Set(placesOf(state, cohort.id).map((subject) => subject.place));
  for (let place = 1; place <= cohort.size; place += 1) if (!taken.has(place)) return place;
  return null;
}

/** True when every place is filled (or the cohort is closed short) and every subject has an outcome. */
export function isComplete(state: TrialState, cohort: Cohort): boolean {
  const places = placesOf(state, cohort.id);
  const isFilled = cohort.isClosedShort || places.length === cohort.size;
  return isFilled && places.every((subject) => subject.state === 'complete');
}

/** The design version with the highest number in a state, or null. */
function latestVersion(state: TrialState, life: DesignVersion['state']): DesignVersion | null {
  const found = values(state.designVersions)
    .filter((version) => version.state === life)
    .sort((a, b) => b.number - a.number);
  return found[0] ?? null;
}

/** The approved version in force, or null before the first approval. */
export function versionInForce(state: TrialState): DesignVersion | null {
  return latestVersion(state, 'approved');
}

export function draftVersion(state: TrialState): DesignVersion | null {
  return latestVersion(state, 'draft');
}

export function submittedVersion(state: TrialState): DesignVersion | null {
  return latestVersion(state, 'submitted');
}

/** The recommendation that waits for signatures, or null; the tables allow one. */
export function awaitingRecommendation(state: TrialState): RecommendationRow | null {
  return values(state.recommendations).find((row) => row.state === 'awaiting') ?? null;
}

/** The revisions made for one cohort number, oldest first. */
export function revisionsOf(state: TrialState, number: number): RecommendationRow[] {
  return values(state.recommendations)
    .filter((row) => row.number === number)
    .sort((a, b) => a.revision - b.revision);
}

/** The halt that stands, or null. */
export function standingHalt(state: TrialState): Halt | null {
  return values(state.halts).find((halt) => halt.liftedAt === null) ?? null;
}

/** Standing signatures on a recommendation, design version or halt, oldest first. */
export function standingSignatures(state: TrialState, signedId: string): Signature[] {
  return values(state.signatures)
    .filter(
      (signature) =>
        signature.isStanding &&
        (signature.recommendationId === signedId ||
          signature.designVersionId === signedId ||
          signature.haltId === signedId),
    )
    .sort((a, b) => a.signedAt.localeCompare(b.signedAt) || a.id.localeCompare(b.id));
}

/** Members whose role stands, by person. */
export function standingMembers(state: TrialState): Member[] {
  return values(state.members).filter((member) => member.endedAt === null);
}

export function standingMember(state: TrialState, personId: string): Member | null {
  const member = state.members[personId];
  return member && member.endedAt === null ? member : null;
}
