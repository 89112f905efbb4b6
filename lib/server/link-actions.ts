import 'server-only';
import { acceptLink } from '@/lib/commands/installation/accept-link';
import { requestPasswordReset } from '@/lib/commands/installation/password-reset';
import { installationInputSchemas } from '@/lib/schemas/installation-inputs';
import { publicAction } from './action';

/** Accepting a link: the token in the input authorises it. */
export const acceptLinkAction = publicAction({
  name: 'accept-link',
  schema: installationInputSchemas['accept-link'],
  run: (input, { submissionKey }) => acceptLink({ submissionKey }, input),
});

/** Asking for a new password. */
export const requestResetAction = publicAction({
  name: 'request-password-reset',
  schema: installationInputSchemas['request-password-reset'],
  run: (input) => requestPasswordReset(input),
});
