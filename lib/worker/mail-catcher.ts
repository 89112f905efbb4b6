import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { models } from '../db/connection';
import { inTransaction } from '../db/transaction';
import { log } from '../log';

const LARGEST_MAIL_BYTES = 5 * 1024 * 1024;

export interface MailCatcher {
  /** The address mails are handed to. */
  readonly smtpUrl: string;
  close(): Promise<void>;
}

/**
 * A mail server on loopback that delivers nothing: it keeps what it gets in the database, where a demo shows it.
 * @returns its address, on a port the system chose
 * @throws Error in an installation that is neither a demo nor a test: there, mail is for its readers only
 */
export async function startMailCatcher(): Promise<MailCatcher> {
  const installation = await models().Installation.findByPk(1, { rejectOnEmpty: true });
  if (installation.kind === 'production')
    throw new Error('Mail is caught in demo and test installations only.');

  const server = new SMTPServer({
    name: 'localhost',
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: LARGEST_MAIL_BYTES,
    logger: false,
    onData(stream, session, callback) {
      simpleParser(stream)
        .then((mail) =>
          keep({
            envelopeTo: session.envelope.rcptTo.map(({ address }) => address).join(', '),
            subject: mail.subject ?? '',
            messageId: mail.messageId ?? '',
            text: mail.text ?? '',
            html: mail.html || '',
          }),
        )
        .then(() => callback())
        .catch((error: unknown) => {
          log().warn({ error }, 'a mail could not be kept');
          callback(new Error('The mail could not be kept; try again.'));
        });
    },
  });
  server.on('error', (error) => log().warn({ error }, 'mail catcher'));
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  const address = server.server.address();
  if (address === null || typeof address === 'string') throw new Error('The mail catcher has no port.');
  return {
    smtpUrl: `smtp://127.0.0.1:${address.port}`,
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}

interface CaughtContent {
  envelopeTo: string;
  subject: string;
  messageId: string;
  text: string;
  html: string;
}

async function keep(content: CaughtContent): Promise<void> {
  await inTransaction(() =>
    models().CaughtMail.create({
      ...content,
      subject: content.subject.slice(0, 500),
      messageId: content.messageId.slice(0, 200),
      receivedAt: new Date(),
    }),
  );
}
