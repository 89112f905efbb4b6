import type { SignDecisionForm } from './sign-decision-form';
import type { TrialFormInput } from './trial-forms';

/** The choices of the decision form; the doses themselves are chosen under `lower`. */
export const SIGN_CHOICES = ['recommended', 'lower', 'return', 'stop'] as const;
export type SignChoice = (typeof SIGN_CHOICES)[number];

/** What a packet's signature is put to. */
export interface PacketReference {
  readonly trialCode: string;
  readonly recommendationId: string;
  readonly seenDigest: string;
  /** The recommended dose, or null where the recommendation is to stop. */
  readonly recommended: string | null;
}

/** The command's input from the form. */
export function decisionInput(
  packet: PacketReference,
  form: SignDecisionForm & { submissionKey: string },
): TrialFormInput<'sign-recommendation'> {
  const { choice, email, password, submissionKey } = form;
  const isRelease = choice === 'recommended' || choice === 'lower';
  return {
    trialCode: packet.trialCode,
    recommendationId: packet.recommendationId,
    seenDigest: packet.seenDigest,
    decision: isRelease ? 'release' : choice,
    dose: choice === 'recommended' ? packet.recommended : choice === 'lower' ? form.dose : null,
    reason: form.reason.trim() === '' || choice === 'recommended' ? null : form.reason,
    email,
    password,
    submissionKey,
  };
}
