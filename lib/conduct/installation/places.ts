import {
  type InstallationContext,
  type InstallationPayloads,
  refuse,
  requireAdministrator,
} from './decision';
import type { PersonFacts } from './links';
import { whyNoTrialRole } from './people';

/** Creates a site; trials take it in one by one. */
export function createSite(
  facts: { readonly codeInUse: boolean },
  input: { readonly code: string; readonly timeZone: string },
  siteId: string,
  context: InstallationContext,
): InstallationPayloads {
  requireAdministrator(context);
  if (facts.codeInUse) {
    refuse('refused', `Not created. There is a site ${input.code} already. Choose another code.`, {
      code: 'Is the code of another site.',
    });
  }
  return [{ kind: 'site-created', siteId, code: input.code, timeZone: input.timeZone }];
}

/** Registers a new trial with its first statistician, who takes it from there. */
export function registerTrial(
  facts: { readonly codeInUse: boolean; readonly statistician: PersonFacts | null },
  input: { readonly code: string },
  trialId: string,
  context: InstallationContext,
): InstallationPayloads {
  requireAdministrator(context);
  if (facts.codeInUse) {
    refuse('refused', `Not created. There is a trial ${input.code} already. Choose another code.`, {
      code: 'Is the code of another trial.',
    });
  }
  const { statistician } = facts;
  if (statistician === null) {
    refuse('not-found', 'Not created. This person does not exist. Choose another one.', {
      statisticianId: 'Choose a person of the list.',
    });
  }
  if (statistician.personId === context.actor.personId) {
    refuse('refused', 'Not created. An administrator grants nothing to themselves; choose another person.', {
      statisticianId: 'This is you.',
    });
  }
  const why = whyNoTrialRole(statistician);
  if (why !== null) refuse('refused', `Not created. ${why}`, { statisticianId: why });
  return [{ kind: 'trial-registered', trialId, code: input.code }];
}
