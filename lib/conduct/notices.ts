import type { TrialRole } from '@/lib/policy/roles';
import type { TrialEvent } from './events';
import type { TrialState } from './state';
import { standingMembers } from './trial-facts';

/** The mails a trial's events bring about, each with its payload; no subject code, grade or free text in any. */
export type NoticePayload =
  | { readonly kind: 'design-submitted'; readonly trialCode: string }
  | { readonly kind: 'design-returned'; readonly trialCode: string }
  | {
      readonly kind: 'recommendation-ready';
      readonly trialCode: string;
      readonly recommendationId: string;
      readonly afterCohort: number | null;
    }
  | {
      readonly kind: 'dose-released';
      readonly trialCode: string;
      readonly releaseId: string;
      readonly cohortNumber: number;
      readonly dose: string;
      readonly unit: string;
      readonly doseNotation: 'plain' | 'powers-of-ten';
      readonly cohortSize: number;
      readonly designVersion: number;
      readonly signers: readonly string[];
      readonly chainHead: string;
    }
  | {
      readonly kind: 'dose-released-summary';
      readonly trialCode: string;
      readonly releaseId: string;
      readonly cohortNumber: number;
      readonly dose: string;
      readonly unit: string;
      readonly doseNotation: 'plain' | 'powers-of-ten';
      readonly chainHead: string;
    }
  | { readonly kind: 'packet-returned'; readonly trialCode: string; readonly cohortNumber: number | null }
  | { readonly kind: 'trial-halted'; readonly trialCode: string; readonly haltId: string }
  | { readonly kind: 'trial-lifted'; readonly trialCode: string }
  | { readonly kind: 'trial-closed'; readonly trialCode: string };

export interface Notice {
  /** The event that causes it, by its place among the decided events. */
  readonly eventIndex: number;
  readonly personId: string;
  /** 0 goes first. */
  readonly priority: number;
  readonly payload: NoticePayload;
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

/** What an event gives notice of, and to which roles. The chain's head is filled in once the events are stored. */
function noticesOf(
  event: TrialEvent,
  state: TrialState,
): { to: readonly TrialRole[]; priority: number; payload: NoticePayload }[] {
  const trialCode = state.trial.code;
  const { payload } = event;
  switch (payload.kind) {
    case 'design-submitted':
      return [{ to: ['reviewer'], priority: 5, payload: { kind: 'design-submitted', trialCode } }];
    case 'design-returned':
      return [{ to: ['statistician'], priority: 5, payload: { kind: 'design-returned', trialCode } }];
    case 'recommendation-computed':
      return [
        {
          to: ['reviewer'],
          priority: 2,
          payload: {
            kind: 'recommendation-ready',
            trialCode,
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
      const common = {
        trialCode,
        releaseId: payload.releaseId,
        cohortNumber: payload.cohortNumber,
        dose: payload.dose,
        unit,
        doseNotation,
        chainHead: '',
      };
      const signers = Object.values(state.signatures)
        .filter((each) => each.isStanding && each.recommendationId === payload.recommendationId)
        .map((each) => each.printedName)
        .sort();
      return [
        {
          to: SITES,
          priority: 1,
          payload: {
            ...common,
            kind: 'dose-released',
            cohortSize,
            designVersion: version.number,
            signers,
          },
        },
        { to: ['sponsor'], priority: 4, payload: { ...common, kind: 'dose-released-summary' } },
      ];
    }
    case 'recommendation-returned': {
      const number = state.recommendations[payload.recommendationId]?.number ?? 1;
      const cohortNumber = number === 1 ? null : number - 1;
      return [
        {
          to: cohortNumber === null ? ['statistician'] : SITES,
          priority: 2,
          payload: { kind: 'packet-returned', trialCode, cohortNumber },
        },
      ];
    }
    case 'trial-halted':
      return [
        { to: EVERYONE, priority: 0, payload: { kind: 'trial-halted', trialCode, haltId: payload.haltId } },
      ];
    case 'trial-lifted':
      return [{ to: EVERYONE, priority: 1, payload: { kind: 'trial-lifted', trialCode } }];
    case 'trial-closed':
      return [{ to: EVERYONE, priority: 1, payload: { kind: 'trial-closed', trialCode } }];
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
