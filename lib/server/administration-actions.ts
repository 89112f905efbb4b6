import 'server-only';
import { createSite } from '@/lib/commands/installation/create-site';
import { createTrial } from '@/lib/commands/installation/create-trial';
import { disablePerson, enablePerson } from '@/lib/commands/installation/disable-person';
import { invitePerson, resendInvitation } from '@/lib/commands/installation/invite-person';
import { resetByAdministrator } from '@/lib/commands/installation/password-reset';
import { retryMail } from '@/lib/commands/installation/retry-mail';
import type { AdministratorRequest } from '@/lib/commands/installation/run-installation-command';
import { installationInputSchemas } from '@/lib/schemas/installation-inputs';
import { type ActionContext, installationAction } from './action';

const requestOf = ({ reader, submissionKey }: ActionContext): AdministratorRequest => ({
  personId: reader.personId,
  submissionKey,
});

/** Inviting a person. */
export const invitePersonAction = installationAction({
  name: 'invite-person',
  schema: installationInputSchemas['invite-person'],
  permission: 'people.manage',
  run: (input, context) => invitePerson(requestOf(context), input),
});

/** Sending an invitation again. */
export const resendInvitationAction = installationAction({
  name: 'resend-invitation',
  schema: installationInputSchemas['resend-invitation'],
  permission: 'people.manage',
  run: (input, context) => resendInvitation(requestOf(context), input),
});

/** Mailing a link for a new password. */
export const resetByAdministratorAction = installationAction({
  name: 'reset-by-administrator',
  schema: installationInputSchemas['reset-by-administrator'],
  permission: 'people.manage',
  run: (input, context) => resetByAdministrator(requestOf(context), input),
});

/** Disabling an account. */
export const disablePersonAction = installationAction({
  name: 'disable-person',
  schema: installationInputSchemas['disable-person'],
  permission: 'people.manage',
  run: (input, context) => disablePerson(requestOf(context), input),
});

/** Enabling an account again. */
export const enablePersonAction = installationAction({
  name: 'enable-person',
  schema: installationInputSchemas['enable-person'],
  permission: 'people.manage',
  run: (input, context) => enablePerson(requestOf(context), input),
});

/** Creating a site. */
export const createSiteAction = installationAction({
  name: 'create-site',
  schema: installationInputSchemas['create-site'],
  permission: 'sites.manage',
  run: (input, context) => createSite(requestOf(context), input),
});

/** Creating a trial with its first statistician. */
export const createTrialAction = installationAction({
  name: 'create-trial',
  schema: installationInputSchemas['create-trial'],
  permission: 'trials.create',
  run: (input, context) => createTrial(requestOf(context), input),
});

/** Queuing a given-up mail again. */
export const retryMailAction = installationAction({
  name: 'retry-mail',
  schema: installationInputSchemas['retry-mail'],
  permission: 'mail.read',
  run: (input, context) => retryMail(requestOf(context), input),
});
