import {
  type InstallationContext,
  type InstallationPayloads,
  refuse,
  requireAdministrator,
} from './decision';
import { newLink, type PersonFacts } from './links';

/** Invites a person: the account waits until the mailed link is used. */
export function invitePerson(
  facts: { readonly addressInUse: boolean },
  input: { readonly isAdministrator: boolean },
  made: { readonly personId: string; readonly linkDigest: string },
  context: InstallationContext,
): InstallationPayloads {
  requireAdministrator(context);
  if (facts.addressInUse) {
    refuse(
      'refused',
      'Not invited. This e-mail address belongs to a person already; find them in the list of people.',
      { email: 'Belongs to a person already.' },
    );
  }
  const { personId, linkDigest } = made;
  return [
    { kind: 'person-invited', personId, isAdministrator: input.isAdministrator },
    ...newLink({ digest: linkDigest, purpose: 'invitation', personId }, false, context),
  ];
}

/** Sends an invitation again; the link sent before stops working. */
export function resendInvitation(
  person: PersonFacts,
  linkDigest: string,
  context: InstallationContext,
): InstallationPayloads {
  requireAdministrator(context);
  if (person.state !== 'invited') {
    refuse(
      'refused',
      person.state === 'active'
        ? 'Not sent. This person has used their invitation; send them a new password link instead.'
        : 'Not sent. This account is disabled; enable it first.',
    );
  }
  return newLink({ digest: linkDigest, purpose: 'invitation', personId: person.personId }, true, context);
}

/** Mails a link for a new password to a person who cannot sign in; the old password works until it is used. */
export function resetByAdministrator(
  person: PersonFacts,
  linkDigest: string,
  context: InstallationContext,
): InstallationPayloads {
  requireAdministrator(context);
  if (person.state !== 'active') {
    refuse(
      'refused',
      person.state === 'invited'
        ? 'Not sent. This person has no password yet; send the invitation again instead.'
        : 'Not sent. This account is disabled; enable it first.',
    );
  }
  return [
    { kind: 'password-reset-requested', personId: person.personId },
    ...newLink({ digest: linkDigest, purpose: 'password-reset', personId: person.personId }, true, context),
  ];
}

/** Disables an account: its sessions and links end at once. What the person did stays under their name. */
export function disablePerson(
  person: PersonFacts,
  otherActiveAdministrators: number,
  context: InstallationContext,
): InstallationPayloads {
  requireAdministrator(context);
  if (person.state === 'disabled') refuse('refused', 'This account is disabled already.');
  if (person.personId === context.actor.personId) {
    refuse('refused', 'Not disabled. This is your own account; another administrator has to disable it.');
  }
  if (person.isAdministrator && otherActiveAdministrators === 0) {
    refuse(
      'refused',
      'Not disabled. This is the last administrator; invite another one first, and wait until they have signed in.',
    );
  }
  return [
    { kind: 'person-disabled', personId: person.personId },
    {
      kind: 'links-ended',
      purposes: ['invitation', 'password-reset'],
      personId: person.personId,
    },
  ];
}

/** Enables a disabled account: as it was, with its old password, or waiting for a new invitation. */
export function enablePerson(person: PersonFacts, context: InstallationContext): InstallationPayloads {
  requireAdministrator(context);
  if (person.state !== 'disabled') refuse('refused', 'This account is not disabled.');
  return [
    {
      kind: 'person-enabled',
      personId: person.personId,
      state: person.hasPassword ? 'active' : 'invited',
    },
  ];
}

/**
 * Why a person may be given no role in any trial, as a sentence, or null when they may. An administrator sees no
 * clinical data and signs nothing, so they hold no role in a trial.
 */
export function whyNoTrialRole(person: PersonFacts): string | null {
  if (person.isAdministrator) {
    return 'This person is an administrator. Administrators see no clinical data and sign nothing, so they hold no role in a trial.';
  }
  if (person.state === 'disabled') return 'This account is disabled; enable it first.';
  return null;
}
