import { canonicalize } from 'json-canonicalize';
import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { type Deciding, refuse } from '../decision';
import { eligibleSigners, requirePermission } from '../permitted';
import { computeRecommendation } from '../recommendation-record';
import { sign } from '../signature';
import type { DesignVersion } from '../state';
import { draftVersion, standingMembers, submittedVersion } from '../trial-facts';

/** Saves the draft of version 1; a statistician of the trial, while it is in draft. */
export function saveDesign(deciding: Deciding, input: TrialInput<'save-design'>): void {
  requirePermission(deciding, 'design.write');
  const { state, context } = deciding;
  if (state.trial.state !== 'draft') {
    refuse(
      'refused',
      'Not saved. The design is in review or in force; a change to a design in force is an amendment, which is not yet offered.',
    );
  }
  const design = canonicalize(input.design);
  const draft = draftVersion(state);
  deciding.emit({
    kind: 'design-saved',
    versionId: draft?.id ?? context.newId(),
    number: draft?.number ?? 1,
    design,
    digest: context.sha256(design),
  });
}

/** Why the draft cannot be submitted yet, as a sentence; null when it can. */
export function whyNotSubmit(deciding: Pick<Deciding, 'state'>): string | null {
  const { state } = deciding;
  const signers = eligibleSigners(state).length;
  if (signers < state.trial.quorum) {
    return `A trial opens only with as many eligible safety reviewers as the quorum. It is ${state.trial.quorum}; ${signers === 1 ? 'one is' : `${signers} are`} in place. Ask an administrator to add them.`;
  }
  const activeSites = Object.values(state.sites).filter((site) => site.state === 'active');
  if (activeSites.length === 0) return 'No site is active in this trial. Ask an administrator to add one.';
  const hasCoordinator = standingMembers(state).some(
    (member) =>
      member.role === 'coordinator' &&
      member.siteIds.some((siteId) => state.sites[siteId]?.state === 'active'),
  );
  if (!hasCoordinator) {
    return 'No active site has a coordinator. Ask an administrator to add one.';
  }
  return null;
}

function namedVersion(found: DesignVersion | null, versionId: string): DesignVersion {
  if (found === null || found.id !== versionId) {
    refuse('conflict', 'The design has moved on since this page was opened. Load the page again.');
  }
  return found;
}

/** Puts the draft up for approval; the trial is then in review. */
export function submitDesign(deciding: Deciding, input: TrialInput<'submit-design'>): void {
  requirePermission(deciding, 'design.write');
  const version = namedVersion(draftVersion(deciding.state), input.versionId);
  const obstacle = whyNotSubmit(deciding);
  if (obstacle !== null) refuse('refused', `Not submitted. ${obstacle}`);
  deciding.emit({ kind: 'design-submitted', versionId: version.id });
}

/** Sends a submitted design back to draft with a reason; any reviewer of the trial. */
export function returnDesign(deciding: Deciding, input: TrialInput<'return-design'>): void {
  requirePermission(deciding, 'design.approve');
  const version = namedVersion(submittedVersion(deciding.state), input.versionId);
  deciding.emit({ kind: 'design-returned', versionId: version.id, reason: input.reason });
}

/** The sentence a reviewer states by approving a design version. */
export function approvalMeaning(trialCode: string, versionNumber: number): string {
  return `I have reviewed design version ${versionNumber} of ${trialCode} and approve it.`;
}

/**
 * Approves a submitted version by signature; a reviewer who did not propose it. The approval computes
 * recommendation 1, the starting dose, which then waits for the quorum like every other step.
 */
export function approveDesign(deciding: Deciding, input: TrialInput<'approve-design'>): void {
  requirePermission(deciding, 'design.approve');
  const version = namedVersion(submittedVersion(deciding.state), input.versionId);
  if (version.digest !== input.seenDigest) {
    refuse(
      'conflict',
      'The design changed since this page was opened. Load the page again and read it anew.',
    );
  }
  sign(
    deciding,
    { designVersionId: version.id, digest: version.digest },
    {
      decision: 'approve',
      dose: null,
      reason: null,
      meaning: approvalMeaning(deciding.state.trial.code, version.number),
    },
  );
  deciding.emit({ kind: 'design-approved', versionId: version.id });
  const approved = deciding.state.designVersions[version.id];
  if (approved) computeRecommendation(deciding, approved, 1);
}
