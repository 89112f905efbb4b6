import type { Design } from '@/lib/schemas/design';
import type { TrialRole } from '@/lib/policy/roles';

/** An instant as ISO 8601 UTC text with milliseconds, as `Date.prototype.toISOString` writes it. */
export type Instant = string;

export type TrialLife = 'draft' | 'in-review' | 'open' | 'halted' | 'closed' | 'locked';

export interface TrialFacts {
  readonly id: string;
  readonly code: string;
  readonly title: string;
  readonly state: TrialLife;
  /** Signatures needed on the same decision and dose. */
  readonly quorum: number;
  readonly createdAt: Instant;
}

export interface TrialSite {
  readonly siteId: string;
  readonly state: 'planned' | 'active' | 'suspended' | 'closed';
}

export interface Member {
  readonly id: string;
  readonly personId: string;
  readonly role: TrialRole;
  readonly siteIds: readonly string[];
  readonly grantedAt: Instant;
  readonly endedAt: Instant | null;
  /** Ever recorded, corrected or dosed in this trial: never again may this person sign a step of it. */
  readonly hasRecordedData: boolean;
}

export interface DesignVersion {
  readonly id: string;
  readonly number: number;
  readonly state: 'draft' | 'submitted' | 'approved';
  readonly design: Design;
  readonly digest: string;
  readonly proposedBy: string;
  readonly savedAt: Instant;
  readonly submittedAt: Instant | null;
  readonly approvedAt: Instant | null;
  readonly returnedReason: string | null;
}

export type RecommendationLife =
  'awaiting' | 'released' | 'stopped' | 'returned' | 'superseded' | 'overtaken';

export interface RecommendationRow {
  readonly id: string;
  /** The number of the cohort it proposes a dose for. */
  readonly number: number;
  readonly revision: number;
  readonly designVersionId: string;
  readonly outcome: 'dose' | 'stop';
  readonly dose: string | null;
  /** The lowest closed dose, or null. */
  readonly closedFrom: string | null;
  readonly state: RecommendationLife;
  /** The stored canonical text it can be computed again from. */
  readonly record: string;
  readonly digest: string;
  readonly softwareVersion: string;
  readonly computedAt: Instant;
}

export interface Release {
  readonly id: string;
  readonly cohortNumber: number;
  readonly recommendationId: string;
  readonly recommendedDose: string;
  readonly dose: string;
  readonly releasedAt: Instant;
}

export interface Cohort {
  readonly id: string;
  readonly number: number;
  readonly size: number;
  readonly designVersionId: string;
  readonly releaseId: string;
  readonly dose: string;
  readonly state: 'open' | 'under-review' | 'signed' | 'cancelled';
  /** Reopened by a return, for answers and corrections only: no new subject, no dosing. */
  readonly isRecordsOnly: boolean;
  readonly isClosedShort: boolean;
  readonly openedAt: Instant;
  readonly completedAt: Instant | null;
}

export type Outcome = 'present' | 'absent' | 'not-evaluable';

export interface Subject {
  readonly id: string;
  readonly cohortId: string;
  readonly cohortSize: number;
  /** The place held in the cohort, from 1; null once released or cancelled. */
  readonly place: number | null;
  readonly siteId: string;
  readonly code: string;
  readonly state: 'reserved' | 'dosed' | 'complete' | 'released' | 'cancelled';
  readonly reservedBy: string;
  readonly reservedAt: Instant;
  readonly releaseReason: string | null;
  readonly dosedAt: Instant | null;
  readonly doseGiven: string | null;
  readonly deviationReason: string | null;
  readonly windowEndsAt: Instant | null;
  readonly dosingRecordedBy: string | null;
  readonly dosingRecordedAt: Instant | null;
  readonly outcome: Outcome | null;
  readonly onsetAt: Instant | null;
  readonly grade: number | null;
  readonly outcomeRecordedBy: string | null;
  readonly outcomeRecordedAt: Instant | null;
  readonly revision: number;
}

export interface Halt {
  readonly id: string;
  readonly haltedBy: string | null;
  readonly haltedAt: Instant;
  readonly reason: string;
  readonly liftedAt: Instant | null;
}

export type SignatureDecision = 'release' | 'return' | 'stop' | 'approve' | 'continue' | 'close-short';

export interface Signature {
  readonly id: string;
  readonly recommendationId: string | null;
  readonly designVersionId: string | null;
  readonly haltId: string | null;
  readonly personId: string;
  readonly printedName: string;
  readonly decision: SignatureDecision;
  readonly dose: string | null;
  readonly reason: string | null;
  readonly meaning: string;
  readonly signedText: string;
  readonly digest: string;
  readonly signedAt: Instant;
  /** False once replaced by the signer's own later one, or lapsed with a halt or a revision. */
  readonly isStanding: boolean;
}

type ById<T> = Readonly<Record<string, T>>;

/**
 * Everything a decision about a trial may depend on. It is loaded from the tables, or rebuilt from the trail by
 * `evolve`; the two are equal. Every collection is keyed by the id of its row (members by person, sites by site).
 */
export interface TrialState {
  readonly trial: TrialFacts;
  readonly sites: ById<TrialSite>;
  readonly members: ById<Member>;
  readonly designVersions: ById<DesignVersion>;
  readonly recommendations: ById<RecommendationRow>;
  readonly releases: ById<Release>;
  readonly cohorts: ById<Cohort>;
  readonly subjects: ById<Subject>;
  readonly halts: ById<Halt>;
  readonly signatures: ById<Signature>;
}
