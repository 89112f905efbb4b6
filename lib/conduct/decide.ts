import { RefusedError } from '@/lib/errors';
import { approveDesign, returnDesign, saveDesign, submitDesign } from './decide/design';
import { recordDosing } from './decide/dosing';
import { haltTrial, signLift } from './decide/halting';
import { addSite, endMembership, grantMembership } from './decide/membership';
import { correctOutcome, recordOutcome, resubmitCohort } from './decide/outcomes';
import { signRecommendation } from './decide/signing';
import { releaseSlot, reserveSlot } from './decide/slots';
import { Deciding, type Decision, type DecisionContext, type TrialCommand } from './decision';
import type { TrialState } from './state';

function apply(deciding: Deciding, command: TrialCommand): void {
  switch (command.type) {
    case 'save-design':
      return saveDesign(deciding, command.input);
    case 'submit-design':
      return submitDesign(deciding, command.input);
    case 'return-design':
      return returnDesign(deciding, command.input);
    case 'approve-design':
      return approveDesign(deciding, command.input);
    case 'sign-recommendation':
      return signRecommendation(deciding, command.input);
    case 'halt-trial':
      return haltTrial(deciding, command.input);
    case 'sign-lift':
      return signLift(deciding, command.input);
    case 'reserve-slot':
      return reserveSlot(deciding, command.input);
    case 'release-slot':
      return releaseSlot(deciding, command.input);
    case 'record-dosing':
      return recordDosing(deciding, command.input);
    case 'record-outcome':
      return recordOutcome(deciding, command.input);
    case 'correct-outcome':
      return correctOutcome(deciding, command.input);
    case 'resubmit-cohort':
      return resubmitCohort(deciding, command.input);
    case 'add-site':
      return addSite(deciding, command.input);
    case 'grant-membership':
      return grantMembership(deciding, command.input);
    case 'end-membership':
      return endMembership(deciding, command.input);
  }
}

/**
 * Decides a command on a trial: the events that follow from it and the state after them, or a typed refusal. Pure: the
 * same state, command and context give the same answer; the clock, ids and hash come in with the context. The caller
 * has parsed the input with `trialInputSchemas`; what cannot happen in a whole state is thrown.
 */
export function decide(state: TrialState, command: TrialCommand, context: DecisionContext): Decision {
  const deciding = new Deciding(state, context);
  try {
    apply(deciding, command);
  } catch (error) {
    if (error instanceof RefusedError) return { ok: false, refusal: error.refusal };
    throw error;
  }
  return { ok: true, events: deciding.events, state: deciding.state };
}
