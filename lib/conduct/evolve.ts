import { designSchema } from '@/lib/schemas/design';
import type { TrialEvent, TrialEventPayload } from './events';
import type { Cohort, RecommendationRow, Signature, Subject, TrialState } from './state';

type PayloadOf<Kind extends TrialEventPayload['kind']> = Extract<TrialEventPayload, { kind: Kind }>;

/** The state before the first event of a trial's chain. */
export const emptyTrialState: TrialState = {
  trial: { id: '', code: '', title: '', state: 'draft', quorum: 2, createdAt: '' },
  sites: {},
  members: {},
  designVersions: {},
  recommendations: {},
  releases: {},
  cohorts: {},
  subjects: {},
  halts: {},
  signatures: {},
};

/** The entry of an id that the event before it must have made; its absence is a broken trail. */
function existing<T>(byId: Readonly<Record<string, T>>, id: string): T {
  const found = byId[id];
  if (found === undefined) throw new Error(`The trail names ${id} before it was made.`);
  return found;
}

function patch<T>(byId: Readonly<Record<string, T>>, id: string, change: Partial<T>): Record<string, T> {
  return { ...byId, [id]: { ...existing(byId, id), ...change } };
}

function patchSubject(state: TrialState, id: string, change: Partial<Subject>): TrialState {
  const revision = existing(state.subjects, id).revision + 1;
  return { ...state, subjects: patch(state.subjects, id, { ...change, revision }) };
}

function patchCohort(state: TrialState, id: string, change: Partial<Cohort>): TrialState {
  return { ...state, cohorts: patch(state.cohorts, id, change) };
}

function patchRecommendation(state: TrialState, id: string, change: Partial<RecommendationRow>): TrialState {
  return { ...state, recommendations: patch(state.recommendations, id, change) };
}

function withLife(state: TrialState, life: TrialState['trial']['state']): TrialState {
  return { ...state, trial: { ...state.trial, state: life } };
}

/** Marks the person as one who recorded data: they may never again sign a step of this trial. */
function recordedBy(state: TrialState, personId: string | null): TrialState {
  const member = personId === null ? undefined : state.members[personId];
  if (!member || member.hasRecordedData) return state;
  return { ...state, members: patch(state.members, member.personId, { hasRecordedData: true }) };
}

/** Standing signatures on something lapse: they stay in the record and no longer count. */
function lapse(state: TrialState, applies: (signature: Signature) => boolean): TrialState {
  const lapsing = Object.values(state.signatures).filter((each) => each.isStanding && applies(each));
  if (lapsing.length === 0) return state;
  const signatures = { ...state.signatures };
  for (const signature of lapsing) signatures[signature.id] = { ...signature, isStanding: false };
  return { ...state, signatures };
}

function signed(state: TrialState, event: TrialEvent, payload: PayloadOf<'signed'>): TrialState {
  const { kind: _kind, signatureId, ...facts } = payload;
  const personId = event.personId ?? '';
  const before = lapse(
    state,
    (each) =>
      each.personId === personId &&
      each.recommendationId === facts.recommendationId &&
      each.designVersionId === facts.designVersionId &&
      each.haltId === facts.haltId,
  );
  const signature: Signature = {
    id: signatureId,
    ...facts,
    personId,
    signedAt: event.occurredAt,
    isStanding: true,
  };
  return { ...before, signatures: { ...before.signatures, [signatureId]: signature } };
}

/** The cohort under review is decided by the release of the next dose, or by a stop. */
function decideCohortUnderReview(state: TrialState): TrialState {
  const cohort = Object.values(state.cohorts).find((each) => each.state === 'under-review');
  return cohort ? patchCohort(state, cohort.id, { state: 'signed' }) : state;
}

function designSaved(state: TrialState, event: TrialEvent, payload: PayloadOf<'design-saved'>): TrialState {
  const before = state.designVersions[payload.versionId];
  return {
    ...state,
    designVersions: {
      ...state.designVersions,
      [payload.versionId]: {
        id: payload.versionId,
        number: payload.number,
        state: 'draft',
        design: designSchema.parse(JSON.parse(payload.design)),
        digest: payload.digest,
        proposedBy: event.personId ?? '',
        savedAt: event.occurredAt,
        submittedAt: null,
        approvedAt: null,
        returnedReason: before?.returnedReason ?? null,
      },
    },
  };
}

function recommendationComputed(
  state: TrialState,
  event: TrialEvent,
  payload: PayloadOf<'recommendation-computed'>,
): TrialState {
  const { kind: _kind, recommendationId, ...facts } = payload;
  return {
    ...state,
    recommendations: {
      ...state.recommendations,
      [recommendationId]: {
        id: recommendationId,
        ...facts,
        state: 'awaiting',
        computedAt: event.occurredAt,
      },
    },
  };
}

function cohortOpened(state: TrialState, event: TrialEvent, payload: PayloadOf<'cohort-opened'>): TrialState {
  const { kind: _kind, cohortId, ...facts } = payload;
  const cohort: Cohort = {
    id: cohortId,
    ...facts,
    state: 'open',
    isRecordsOnly: false,
    isClosedShort: false,
    openedAt: event.occurredAt,
    completedAt: null,
  };
  return { ...state, cohorts: { ...state.cohorts, [cohortId]: cohort } };
}

function slotReserved(state: TrialState, event: TrialEvent, payload: PayloadOf<'slot-reserved'>): TrialState {
  const { kind: _kind, subjectId, ...facts } = payload;
  const subject: Subject = {
    id: subjectId,
    ...facts,
    state: 'reserved',
    reservedBy: event.personId ?? '',
    reservedAt: event.occurredAt,
    releaseReason: null,
    dosedAt: null,
    doseGiven: null,
    deviationReason: null,
    windowEndsAt: null,
    dosingRecordedBy: null,
    dosingRecordedAt: null,
    outcome: null,
    onsetAt: null,
    grade: null,
    outcomeRecordedBy: null,
    outcomeRecordedAt: null,
    revision: 1,
  };
  return recordedBy({ ...state, subjects: { ...state.subjects, [subjectId]: subject } }, event.personId);
}

function memberGranted(
  state: TrialState,
  event: TrialEvent,
  payload: PayloadOf<'member-granted'>,
): TrialState {
  const before = state.members[payload.personId];
  return {
    ...state,
    members: {
      ...state.members,
      [payload.personId]: {
        id: payload.membershipId,
        personId: payload.personId,
        role: payload.role,
        siteIds: payload.siteIds,
        grantedAt: event.occurredAt,
        endedAt: null,
        hasRecordedData: before?.hasRecordedData ?? false,
      },
    },
  };
}

function cohortClosedShort(state: TrialState, payload: PayloadOf<'cohort-closed-short'>): TrialState {
  const closed = patchCohort(state, payload.cohortId, { isClosedShort: true });
  return payload.cancelledSubjectIds.reduce(
    (each, subjectId) => patchSubject(each, subjectId, { state: 'cancelled', place: null }),
    closed,
  );
}

/** The state after an event. Pure; replaying a trial's chain from `emptyTrialState` gives its tables. */
export function evolve(state: TrialState, event: TrialEvent): TrialState {
  const { payload, occurredAt, personId } = event;
  switch (payload.kind) {
    case 'trial-created':
      return {
        ...state,
        trial: {
          id: payload.trialId,
          code: payload.code,
          title: payload.title,
          quorum: payload.quorum,
          state: 'draft',
          createdAt: occurredAt,
        },
      };
    case 'site-added':
      return {
        ...state,
        sites: { ...state.sites, [payload.siteId]: { siteId: payload.siteId, state: payload.state } },
      };
    case 'member-granted':
      return memberGranted(state, event, payload);
    case 'member-ended':
      return { ...state, members: patch(state.members, payload.personId, { endedAt: occurredAt }) };
    case 'design-saved':
      return designSaved(state, event, payload);
    case 'design-submitted':
      return withLife(
        {
          ...state,
          designVersions: patch(state.designVersions, payload.versionId, {
            state: 'submitted',
            submittedAt: occurredAt,
          }),
        },
        'in-review',
      );
    case 'design-returned':
      return lapse(
        withLife(
          {
            ...state,
            designVersions: patch(state.designVersions, payload.versionId, {
              state: 'draft',
              approvedAt: null,
              returnedReason: payload.reason,
            }),
          },
          'draft',
        ),
        (signature) => signature.designVersionId === payload.versionId,
      );
    case 'design-approved':
      return {
        ...state,
        designVersions: patch(state.designVersions, payload.versionId, {
          state: 'approved',
          approvedAt: occurredAt,
          returnedReason: null,
        }),
      };
    case 'recommendation-computed':
      return recommendationComputed(state, event, payload);
    case 'signed':
      return signed(state, event, payload);
    case 'dose-released': {
      const { kind: _kind, releaseId, ...facts } = payload;
      const released = patchRecommendation(state, payload.recommendationId, { state: 'released' });
      return decideCohortUnderReview({
        ...released,
        releases: {
          ...released.releases,
          [releaseId]: { id: releaseId, ...facts, releasedAt: occurredAt },
        },
      });
    }
    case 'trial-opened':
      return withLife(state, 'open');
    case 'cohort-opened':
      return cohortOpened(state, event, payload);
    case 'slot-reserved':
      return slotReserved(state, event, payload);
    case 'slot-released':
      return patchSubject(state, payload.subjectId, {
        state: 'released',
        place: null,
        releaseReason: payload.reason,
      });
    case 'dosing-recorded': {
      const { kind: _kind, subjectId, ...facts } = payload;
      return recordedBy(
        patchSubject(state, subjectId, {
          ...facts,
          state: 'dosed',
          dosingRecordedBy: personId,
          dosingRecordedAt: occurredAt,
        }),
        personId,
      );
    }
    case 'outcome-recorded': {
      const { kind: _kind, subjectId, ...facts } = payload;
      return recordedBy(
        patchSubject(state, subjectId, {
          ...facts,
          state: 'complete',
          outcomeRecordedBy: personId,
          outcomeRecordedAt: occurredAt,
        }),
        personId,
      );
    }
    case 'outcome-corrected':
      return recordedBy(patchSubject(state, payload.subjectId, payload.after), personId);
    case 'cohort-completed':
      return patchCohort(state, payload.cohortId, {
        state: 'under-review',
        isRecordsOnly: false,
        completedAt: occurredAt,
      });
    case 'cohort-closed-short':
      return cohortClosedShort(state, payload);
    case 'recommendation-returned': {
      const returned = patchRecommendation(state, payload.recommendationId, { state: 'returned' });
      const cohort = Object.values(returned.cohorts).find((each) => each.state === 'under-review');
      return cohort ? patchCohort(returned, cohort.id, { state: 'open', isRecordsOnly: true }) : returned;
    }
    case 'recommendation-superseded':
    case 'recommendation-overtaken':
      return lapse(
        patchRecommendation(state, payload.recommendationId, {
          state: payload.kind === 'recommendation-superseded' ? 'superseded' : 'overtaken',
        }),
        (signature) => signature.recommendationId === payload.recommendationId,
      );
    case 'trial-halted':
      return withLife(
        {
          ...state,
          halts: {
            ...state.halts,
            [payload.haltId]: {
              id: payload.haltId,
              haltedBy: personId,
              haltedAt: occurredAt,
              reason: payload.reason,
              liftedAt: null,
            },
          },
        },
        'halted',
      );
    case 'trial-lifted':
      return withLife(
        { ...state, halts: patch(state.halts, payload.haltId, { liftedAt: occurredAt }) },
        'open',
      );
    case 'trial-closed': {
      const closed = payload.recommendationId
        ? patchRecommendation(state, payload.recommendationId, { state: 'stopped' })
        : state;
      return withLife(decideCohortUnderReview(closed), 'closed');
    }
  }
}

/** The state after a chain of events, from the first. */
export function replay(events: Iterable<TrialEvent>): TrialState {
  let state = emptyTrialState;
  for (const event of events) state = evolve(state, event);
  return state;
}
