import 'server-only';
import { changePassword } from '@/lib/commands/change-password';
import { endOwnSession } from '@/lib/commands/end-session';
import { changePasswordSchema, endSessionSchema } from '@/lib/schemas/account';
import { readerAction } from './action';

/** Changes one's own password; the present one is asked for. */
export const changePasswordAction = readerAction({
  name: 'change-password',
  schema: changePasswordSchema,
  permits: 'own-account',
  run: (input, { reader, clientAddress }) =>
    changePassword({
      personId: reader.personId,
      email: reader.email,
      printedName: reader.printedName,
      sessionId: reader.sessionId,
      clientAddress,
      ...input,
    }),
});

/** Ends another session of one's own. */
export const endSessionAction = readerAction({
  name: 'end-session',
  schema: endSessionSchema,
  permits: 'own-account',
  run: ({ sessionId }, { reader }) => endOwnSession(reader.personId, sessionId),
});
