'use server';

import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import { runTrialAction } from '@/lib/server/action';

/** Halts the trial at once, with a reason and without a password. */
export async function haltTrial(input: TrialFormInput<'halt-trial'>) {
  return runTrialAction('halt-trial', input);
}
