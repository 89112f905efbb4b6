/*
 * The background process: sends the mails of the outbox. Any number of them may share one database.
 * Run: node --import tsx lib/worker/main.ts
 */
import { randomUUID } from 'node:crypto';
import { hostname } from 'node:os';
import { closeDatabase, models } from '../db/connection';
import { environment } from '../env';
import { log } from '../log';
import { deliverNextMail, type MailDelivery } from './deliver-mail';
import { repeat } from './loop';
import { type MailCatcher, startMailCatcher } from './mail-catcher';
import { mailContent } from './mail-content';
import { mailSender } from './send';

const IDLE_MS = 500;
const UNAVAILABLE_MS = 5_000;

const ending = new AbortController();
for (const name of ['SIGINT', 'SIGTERM'] as const) process.once(name, () => ending.abort());

/** Where mails go: the configured server, else the catcher of a demo or a test; null where they are held. */
async function mailServer(): Promise<{ smtpUrl: string; catcher: MailCatcher | null } | null> {
  const { smtpUrl } = environment();
  if (smtpUrl) return { smtpUrl, catcher: null };
  const installation = await models().Installation.findByPk(1, { rejectOnEmpty: true });
  if (installation.kind === 'production') return null;
  const catcher = await startMailCatcher();
  return { smtpUrl: catcher.smtpUrl, catcher };
}

async function main(): Promise<void> {
  const server = await mailServer();
  const loops: Promise<void>[] = [];
  if (server === null) {
    log().warn('SMTP_URL is not set: mail is held');
    const held = setInterval(() => undefined, 60_000);
    ending.signal.addEventListener('abort', () => clearInterval(held));
  } else {
    const delivery: MailDelivery = {
      owner: `${hostname().slice(0, 40)}:${randomUUID()}`,
      send: mailSender(server.smtpUrl, environment().mailFrom),
      ...mailContent,
    };
    const step = async (): Promise<number> => {
      const result = await deliverNextMail(delivery);
      return result === 'done' ? 0 : result === 'idle' ? IDLE_MS : UNAVAILABLE_MS;
    };
    loops.push(repeat('mail', step, ending.signal));
  }
  process.send?.('ready');
  log().info({ mail: server === null ? 'held' : server.catcher ? 'caught' : 'sent' }, 'worker runs');

  await new Promise<void>((resolve) => {
    if (ending.signal.aborted) resolve();
    else ending.signal.addEventListener('abort', () => resolve());
  });
  await Promise.all(loops);
  await server?.catcher?.close();
  await closeDatabase();
  log().info('worker ended');
  if (process.connected) process.disconnect();
}

main().catch((error: unknown) => {
  log().error({ error }, 'worker failed');
  process.exit(1);
});
