import * as mail from '@/lib/conduct/installation/mail';
import { models } from '@/lib/db/connection';
import { notFound } from '@/lib/errors';
import type { InstallationInput } from '@/lib/schemas/installation-inputs';
import { type AdministratorRequest, runAdministratorCommand } from './run-installation-command';

/** Puts a mail that was given up back into the queue; the worker tries it again from the start. */
export function retryMail(
  request: AdministratorRequest,
  input: InstallationInput<'retry-mail'>,
): Promise<{ mailId: string }> {
  return runAdministratorCommand('retry-mail', 'mail.read', request, async (context) => {
    const row = await models().OutboxMail.findByPk(input.mailId);
    if (row === null) throw notFound('This mail');
    return { payloads: mail.retryMail(row, context), result: { mailId: row.id } };
  });
}
