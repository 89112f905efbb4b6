'use server';

import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import { runTrialAction } from '@/lib/server/action';
import { createTrialAction } from '@/lib/server/administration-actions';

/** Creates a trial with its first statistician. */
export async function createTrial(input: Parameters<typeof createTrialAction>[0]) {
  return createTrialAction(input);
}

/** Takes a site into a trial. */
export async function addSite(input: TrialFormInput<'add-site'>) {
  return runTrialAction('add-site', input);
}

/** Grants a role in a trial. */
export async function grantMembership(input: TrialFormInput<'grant-membership'>) {
  return runTrialAction('grant-membership', input);
}

/** Ends a person's role in a trial. */
export async function endMembership(input: TrialFormInput<'end-membership'>) {
  return runTrialAction('end-membership', input);
}
