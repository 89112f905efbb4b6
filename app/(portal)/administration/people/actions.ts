'use server';

import {
  disablePersonAction,
  enablePersonAction,
  invitePersonAction,
  resendInvitationAction,
  resetByAdministratorAction,
} from '@/lib/server/administration-actions';

/** Invites a person and mails them a link. */
export async function invitePerson(input: Parameters<typeof invitePersonAction>[0]) {
  return invitePersonAction(input);
}

/** Sends an invitation again. */
export async function resendInvitation(input: Parameters<typeof resendInvitationAction>[0]) {
  return resendInvitationAction(input);
}

/** Mails a link for a new password. */
export async function resetPassword(input: Parameters<typeof resetByAdministratorAction>[0]) {
  return resetByAdministratorAction(input);
}

/** Disables an account at once. */
export async function disablePerson(input: Parameters<typeof disablePersonAction>[0]) {
  return disablePersonAction(input);
}

/** Enables an account again. */
export async function enablePerson(input: Parameters<typeof enablePersonAction>[0]) {
  return enablePersonAction(input);
}
