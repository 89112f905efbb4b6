'use server';

import { acceptLinkAction, requestResetAction } from '@/lib/server/link-actions';

/** Uses a single-use link: sets a password, or creates the first administrator. */
export async function acceptLink(input: Parameters<typeof acceptLinkAction>[0]) {
  return acceptLinkAction(input);
}

/** Asks for a link to choose a new password. The answer does not tell whether the address is known. */
export async function requestPasswordReset(input: Parameters<typeof requestResetAction>[0]) {
  return requestResetAction(input);
}
