import { type Decision, type DecisionContext, Deciding } from './decision';
import { emptyTrialState } from './evolve';

/** The first events of a trial: its code, title and first statistician, named by an administrator. */
export function createTrial(
  input: { readonly code: string; readonly title: string; readonly statisticianId: string },
  context: DecisionContext,
): Decision & { ok: true } {
  const deciding = new Deciding(emptyTrialState, context);
  deciding.emit({
    kind: 'trial-created',
    trialId: context.newId(),
    code: input.code,
    title: input.title,
    quorum: 2,
  });
  deciding.emit({
    kind: 'member-granted',
    membershipId: context.newId(),
    personId: input.statisticianId,
    role: 'statistician',
    siteIds: [],
  });
  return { ok: true, events: deciding.events, state: deciding.state };
}
