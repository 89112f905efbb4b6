'use server';

import { changePasswordAction, endSessionAction } from '@/lib/server/account-actions';

/** Changes the reader's own password. */
export async function changePassword(input: Parameters<typeof changePasswordAction>[0]) {
  return changePasswordAction(input);
}

/** Ends another session of the reader. */
export async function endSession(input: Parameters<typeof endSessionAction>[0]) {
  return endSessionAction(input);
}
