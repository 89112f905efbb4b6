import { equalDecimals } from '@/lib/design/decimal';
import type { TrialRole } from '@/lib/policy/roles';
import type { UnchainedNotice } from '@/lib/schemas/mail-payloads';
import type { TrialEvent } from './events';
import type { TrialState } from './state';
import { standingMembers } from './trial-facts';

export interface Notice {
  /** The event that causes it, by its place among the decided events. */
  readonly eventIndex: number;
  readonly personId: string;
  /** 0 goes first. */
  readonly priority: number;
  /** No subject code, grade or free text. */
  readonly payload: UnchainedNotice;
}

const EVERYONE: readonly TrialRole[] = [
  'coordinator',
  'investigator',
  'reviewer',
  'statistician',
  'sponsor',
  'monitor',
];
const SITES: readonly TrialRole[] = ['coordinator', 'investigator'];

interface NoticeOfEvent {
  readonly to: readonly TrialRole[];
  readonly priority: number;
  readonly payload: UnchainedNotice;
}

/** What an event gives notice of, and to which roles. The chain's head is added once the events are stored. */
function noticesOf({ occurredAt, payload }: TrialEvent, state: TrialState): NoticeOfEvent[] {
  const common = { trialCode: state.trial.code, occurredAt };
  switch (payload.kind) {
    case 'design-submitted':
    case 'design-returned': {
      const { kind, versionId } = payload;
      const version = state.designVersions[versionId];
      if (!version) throw new Error('A design without its version.');
      return [
        {
          to: kind === 'design-submitted' ? ['reviewer'] : ['statistician'],
          priority: 5,
          payload: { ...common, kind, versionId, designVersion: version.number },
        },
      ];
    }
    case 'recommendation-computed':
      return [
        {
          to: ['reviewer'],
          priority: 2,
          payload: {
            ...common,
            kind: 'recommendation-ready',
            recommendationId: payload.recommendationId,
            afterCohort: payload.number === 1 ? null : payload.number - 1,
          },
        },
      ];
    case 'dose-released': {
      const recommendation = state.recommendations[payload.recommendationId];
      const version = recommendation && state.designVersions[recommendation.designVersionId];
      if (!version) throw new Error('A release without its design version.');
      const { unit, doseNotation, cohortSize } = version.design;
      const { releaseId, cohortNumber, dose } = payload;
      const released = { ...common, releaseId, cohortNumber, dose, unit, doseNotation };
      const signers = Object.values(state.signatures)
        .filter(
          (each) =>
            each.isStanding &&
            each.recommendationId === payload.recommendationId &&
            each.decision === 'release' &&
            each.dose !== null &&
            equalDecimals(each.dose, dose),
        )
        .map((each) => each.printedName)
        .sort();
      return [
        {
          to: SITES,
          priority: 1,
          payload: { ...released, kind: 'dose-released', cohortSize, designVersion: version.number, signers },
        },
        { to: ['sponsor'], priority: 4, payload: { ...released, kind: 'dose-released-summary' } },
      ];
    }
    case 'recommendation-returned': {
      const number = state.recommendations[payload.recommendationId]?.number ?? 1;
      // A returned starting dose sends the design back, of which there is a notice of its own.
      if (number === 1) return [];
      return [
        {
          to: SITES,
          priority: 2,
          payload: { ...common, kind: 'packet-returned', cohortNumber: number - 1 },
        },
      ];
    }
    case 'trial-halted':
      return [
        { to: EVERYONE, priority: 0, payload: { ...common, kind: 'trial-halted', haltId: payload.haltId } },
      ];
    case 'trial-lifted':
      return [
        { to: EVERYONE, priority: 1, payload: { ...common, kind: 'trial-lifted', haltId: payload.haltId } },
      ];
    case 'trial-closed':
      return [{ to: EVERYONE, priority: 1, payload: { ...common, kind: 'trial-closed' } }];
    default:
      return [];
  }
}

/** Everyone to be told of a decision's events, once per event and person. `state` is the state after them. */
export function noticesFor(events: readonly TrialEvent[], state: TrialState): Notice[] {
  const members = standingMembers(state);
  return events.flatMap((event, eventIndex) =>
    noticesOf(event, state).flatMap(({ to, priority, payload }) =>
      members
        .filter((member) => to.includes(member.role))
        .map((member) => ({ eventIndex, personId: member.personId, priority, payload })),
    ),
  );
}
