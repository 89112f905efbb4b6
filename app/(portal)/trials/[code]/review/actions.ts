'use server';

import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import { runTrialAction } from '@/lib/server/action';

/** Signs the awaiting recommendation: release, return or stop. */
export async function signRecommendation(input: TrialFormInput<'sign-recommendation'>) {
  return runTrialAction('sign-recommendation', input);
}

/** Signs the lifting of a halt. */
export async function signLift(input: TrialFormInput<'sign-lift'>) {
  return runTrialAction('sign-lift', input);
}
