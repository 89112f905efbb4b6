import { compareDecimals, equalDecimals } from '@/lib/design/decimal';
import { doseText } from '@/lib/design/dose-text';
import { isDesignDose } from '../design-doses';
import type { Design } from '@/lib/schemas/design';
import type { TrialInput } from '@/lib/schemas/trial-inputs';
import { type Deciding, refuse } from '../decision';
import { requirePermission } from '../permitted';
import { sign } from '../signature';
import type { RecommendationRow, TrialState } from '../state';
import { awaitingRecommendation, standingSignatures } from '../trial-facts';

/** The sentence a signer states by signing. */
export function meaningOf(
  trialCode: string,
  design: Design,
  recommendation: Pick<RecommendationRow, 'number'>,
  decision: 'release' | 'return' | 'stop',
  dose: string | null,
): string {
  const { number } = recommendation;
  const reviewed =
    number === 1
      ? `I have reviewed the design of ${trialCode}`
      : `I have reviewed cohort ${number - 1}'s data`;
  if (decision === 'return') return `${reviewed} and return the packet with questions.`;
  if (decision === 'stop') return `${reviewed} and stop dosing in ${trialCode} for good.`;
  return `${reviewed} and release ${doseText(design, dose ?? '')} for cohort ${number}.`;
}

/** Why a dose may not be released on a recommendation, as a sentence; null when it may. */
export function whyNotRelease(
  recommendation: RecommendationRow,
  design: Design,
  dose: string,
): string | null {
  const { dose: recommended, closedFrom } = recommendation;
  if (recommended === null) return 'The recommendation is to stop; no dose can be released on it.';
  if (compareDecimals(dose, recommended) > 0) {
    return `A dose above the recommended ${doseText(design, recommended)} cannot be released by anyone.`;
  }
  if (!isDesignDose(design.doses, dose)) return `${doseText(design, dose)} is not a dose of the design.`;
  if (closedFrom !== null && compareDecimals(dose, closedFrom) >= 0) {
    return `${doseText(design, closedFrom)} and above are closed.`;
  }
  return null;
}

/** The decision a recommendation's standing signatures have reached, or null while they have not. */
export function reachedDecision(
  state: TrialState,
  recommendation: RecommendationRow,
): { readonly decision: 'release'; readonly dose: string } | { readonly decision: 'stop' } | null {
  const standing = standingSignatures(state, recommendation.id);
  const { quorum } = state.trial;
  const stops = standing.filter((signature) => signature.decision === 'stop');
  if (stops.length >= quorum) return { decision: 'stop' };
  if (stops.length > 0) return null;
  const lowestFirst = standing
    .flatMap((signature) => (signature.decision === 'release' && signature.dose ? [signature.dose] : []))
    .sort(compareDecimals);
  const lowest = lowestFirst[0];
  if (lowest === undefined) return null;
  const onLowest = lowestFirst.filter((dose) => equalDecimals(dose, lowest)).length;
  return onLowest >= quorum ? { decision: 'release', dose: lowest } : null;
}

function release(deciding: Deciding, recommendation: RecommendationRow, dose: string): void {
  const { context } = deciding;
  const version = deciding.state.designVersions[recommendation.designVersionId];
  if (!version || recommendation.dose === null) throw new Error('A release without its design or dose.');
  const releaseId = context.newId();
  deciding.emit({
    kind: 'dose-released',
    releaseId,
    recommendationId: recommendation.id,
    cohortNumber: recommendation.number,
    recommendedDose: recommendation.dose,
    dose,
  });
  if (deciding.state.trial.state === 'in-review') deciding.emit({ kind: 'trial-opened' });
  deciding.emit({
    kind: 'cohort-opened',
    cohortId: context.newId(),
    number: recommendation.number,
    size: version.design.cohortSize,
    designVersionId: version.id,
    releaseId,
    dose,
  });
}

/** Returns a packet: the cohort reopens for records; the starting dose sends the design back to draft. */
function returnPacket(deciding: Deciding, recommendation: RecommendationRow, reason: string): void {
  deciding.emit({ kind: 'recommendation-returned', recommendationId: recommendation.id });
  if (recommendation.number === 1) {
    deciding.emit({ kind: 'design-returned', versionId: recommendation.designVersionId, reason });
  }
}

/**
 * Signs the awaiting recommendation: release at its dose or a lower one, return, or stop. A return acts at once; a
 * release or stop when the quorum stands on the same dose or on the stop. A standing signature for a lower dose or a
 * stop blocks any higher release, so that signers who differ end at the lower dose or return the packet.
 */
export function signRecommendation(deciding: Deciding, input: TrialInput<'sign-recommendation'>): void {
  requirePermission(deciding, 'recommendation.sign');
  const { state } = deciding;
  const recommendation = awaitingRecommendation(state);
  if (recommendation === null || recommendation.id !== input.recommendationId) {
    refuse(
      'conflict',
      'Not signed. This recommendation is no longer waiting: it was decided, or the data changed, since this page was opened. Load the page again.',
    );
  }
  if (recommendation.digest !== input.seenDigest) {
    refuse('conflict', 'Not signed. The packet changed since this page was opened. Load the page again.');
  }
  if (state.trial.state === 'halted') {
    refuse('refused', 'Not signed. The trial is halted; it must be lifted before a dose is released.');
  }
  const version = state.designVersions[recommendation.designVersionId];
  if (!version) throw new Error('A recommendation without its design version.');
  const { decision, reason } = input;
  const dose = decision === 'release' ? input.dose : null;
  if (decision === 'release') {
    if (dose === null)
      refuse('invalid', 'Choose the dose to release.', { dose: 'Choose the dose to release.' });
    const obstacle = whyNotRelease(recommendation, version.design, dose);
    if (obstacle !== null) refuse('refused', `Not signed. ${obstacle}`, { dose: obstacle });
    const isLower = recommendation.dose !== null && !equalDecimals(dose, recommendation.dose);
    if (isLower && reason === null) {
      refuse('invalid', 'Not signed. A dose below the recommended one needs a reason.', {
        reason: 'Give the reason; it is kept with your signature.',
      });
    }
  } else if (reason === null) {
    refuse('invalid', 'Not signed. Give the reason; it is kept with your signature.', {
      reason: 'Give the reason; it is kept with your signature.',
    });
  }
  sign(
    deciding,
    { recommendationId: recommendation.id, digest: recommendation.digest },
    {
      decision,
      dose,
      reason,
      meaning: meaningOf(state.trial.code, version.design, recommendation, decision, dose),
    },
  );
  if (decision === 'return') {
    returnPacket(deciding, recommendation, reason ?? '');
    return;
  }
  const reached = reachedDecision(deciding.state, recommendation);
  if (reached?.decision === 'stop') {
    deciding.emit({ kind: 'trial-closed', recommendationId: recommendation.id });
  } else if (reached?.decision === 'release') {
    release(deciding, recommendation, reached.dose);
  }
}
