import { z } from 'zod';
import type { TrialFormInput } from './trial-forms';
import { credentialsSchema, TEXT_LIMITS } from './trial-inputs';

/** The choices of the decision form; the doses themselves are chosen under `lower`. */
export const SIGN_CHOICES = ['recommended', 'lower', 'return', 'stop'] as const;
export type SignChoice = (typeof SIGN_CHOICES)[number];

/**
 * The decision as a reviewer fills it in: one choice, the lower dose and the reason where the choice asks for them, and
 * the credentials. `decisionInput` turns it into the command's own input, which the server checks again in full.
 */
export const signDecisionFormSchema = z
  .strictObject({
    choice: z.enum(SIGN_CHOICES, { error: 'Choose a decision.' }),
    dose: z.string().max(40),
    reason: z.string().max(TEXT_LIMITS.reason * 2, { error: 'The reason has at most 2000 characters.' }),
    ...credentialsSchema,
  })
  .superRefine((form, context) => {
    if (form.choice === 'lower' && form.dose === '') {
      context.addIssue({ code: 'custom', path: ['dose'], message: 'Choose the dose to release.' });
    }
    if (form.choice !== 'recommended' && form.reason.trim().length < 5) {
      context.addIssue({
        code: 'custom',
        path: ['reason'],
        message: 'Give the reason; it is kept with your signature.',
      });
    }
  });

export type SignDecisionForm = z.input<typeof signDecisionFormSchema>;

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
