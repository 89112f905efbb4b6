import { createTransport, type Transporter } from 'nodemailer';

/** A mail as it goes out. */
export interface OutgoingMail {
  readonly address: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  /** The same at every try, so that a mail delivered twice is known to be one. */
  readonly messageId: string;
}

export type SendMail = (mail: OutgoingMail) => Promise<void>;

/** The mail server could not be reached or does not let us in: no mail would pass now. */
export class MailServerUnavailableError extends Error {
  constructor(cause: unknown) {
    super(cause instanceof Error ? cause.message : String(cause), { cause });
    this.name = 'MailServerUnavailableError';
  }
}

const CONNECTION_TIMEOUT_MS = 10_000;
const SILENCE_TIMEOUT_MS = 20_000;
/** Well inside the lease of a claimed mail (lib/worker/outbox.ts). */
const LONGEST_SENDING_MS = 60_000;

/** Failures of one mail's envelope or content, answered by a server that works. */
const REFUSALS = new Set(['EENVELOPE', 'EMESSAGE', 'ESTREAM']);

/**
 * Hands mails to one mail server.
 * @param smtpUrl smtp:// or smtps:// address, with user and password where the server asks for them
 * @param from the sender, "Name <address>"
 * @returns a function that resolves when the server has taken the mail; it throws MailServerUnavailableError
 *   when no mail would pass, another Error when this mail was refused
 */
export function mailSender(smtpUrl: string, from: string): SendMail {
  const transport = createTransport(
    {
      url: smtpUrl,
      connectionTimeout: CONNECTION_TIMEOUT_MS,
      greetingTimeout: CONNECTION_TIMEOUT_MS,
      socketTimeout: SILENCE_TIMEOUT_MS,
      disableFileAccess: true,
      disableUrlAccess: true,
    },
    { from },
  );
  return (mail) => sendOver(transport, mail);
}

async function sendOver(transport: Transporter, mail: OutgoingMail): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const tooLong = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error('The mail server took too long.')), LONGEST_SENDING_MS);
  });
  try {
    const sending = transport.sendMail({
      to: { name: '', address: mail.address },
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
      messageId: mail.messageId,
      headers: { 'Auto-Submitted': 'auto-generated' },
    });
    await Promise.race([sending, tooLong]);
  } catch (error) {
    if (isRefusal(error)) throw error;
    throw new MailServerUnavailableError(error);
  } finally {
    clearTimeout(timer);
  }
}

function isRefusal(error: unknown): boolean {
  return (
    error instanceof Error && 'code' in error && typeof error.code === 'string' && REFUSALS.has(error.code)
  );
}
