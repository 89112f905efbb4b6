'use server';

import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import { runTrialAction } from '@/lib/server/action';

/** Saves the draft of the design. */
export async function saveDesign(input: TrialFormInput<'save-design'>) {
  return runTrialAction('save-design', input);
}

/** Puts the draft up for approval. */
export async function submitDesign(input: TrialFormInput<'submit-design'>) {
  return runTrialAction('submit-design', input);
}

/** Sends a submitted design back to draft, with a reason. */
export async function returnDesign(input: TrialFormInput<'return-design'>) {
  return runTrialAction('return-design', input);
}

/** Approves a submitted design by signature. */
export async function approveDesign(input: TrialFormInput<'approve-design'>) {
  return runTrialAction('approve-design', input);
}
