import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { models } from '@/lib/db/connection';
import { deliverNextMail, type MailDelivery } from '@/lib/worker/deliver-mail';
import { claimMail, markFailed, markSent, MOST_REFUSALS } from '@/lib/worker/outbox';
import { MailServerUnavailableError } from '@/lib/worker/send';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
beforeEach(() => database.asOwner((owner) => owner.query('DELETE FROM outbox')));

async function queue(
  fields: { priority?: number; cause?: string; minutesAgo?: number; payload?: object } = {},
): Promise<string> {
  const id = randomUUID();
  await database.asOwner((owner) =>
    owner.query(
      `INSERT INTO outbox (id, kind, cause, address, payload, priority, state, message_id, created_at)
       VALUES (?, 'notice', ?, 'reader@example.org', ?, ?, 'queued', ?, UTC_TIMESTAMP(3) - INTERVAL ? MINUTE)`,
      [
        id,
        fields.cause ?? id,
        JSON.stringify(fields.payload ?? {}),
        fields.priority ?? 5,
        `<${id}@stepwell.invalid>`,
        fields.minutesAgo ?? 0,
      ],
    ),
  );
  return id;
}

const endLease = (id: string): Promise<unknown> =>
  database.asOwner((owner) =>
    owner.query('UPDATE outbox SET lease_until = UTC_TIMESTAMP(6) - INTERVAL 1 SECOND WHERE id = ?', [id]),
  );
const endPause = (): Promise<unknown> =>
  database.asOwner((owner) => owner.query('UPDATE outbox SET next_attempt_at = NULL'));
const row = (id: string) => models().OutboxMail.findByPk(id, { rejectOnEmpty: true });

function delivery(owner: string, sent: string[], changes: Partial<MailDelivery> = {}): MailDelivery {
  return {
    owner,
    send: (mail) => {
      sent.push(mail.messageId);
      return Promise.resolve();
    },
    render: () => Promise.resolve({ subject: 's', html: '<p>h</p>', text: 't' }),
    stillHolds: () => Promise.resolve(true),
    ...changes,
  };
}

async function drain(worker: MailDelivery): Promise<void> {
  while ((await deliverNextMail(worker)) !== 'idle');
}

describe('claims', () => {
  it('give each of sixty mails to one of six workers at once, and each is sent once', async () => {
    await Promise.all(Array.from({ length: 60 }, () => queue()));
    const sent: string[] = [];
    await Promise.all(Array.from({ length: 6 }, (_, index) => drain(delivery(`worker ${index}`, sent))));
    expect(sent).toHaveLength(60);
    expect(new Set(sent).size).toBe(60);
    expect(await models().OutboxMail.count({ where: { state: 'sent' } })).toBe(60);
  });

  it('take the lowest priority number first, then the oldest', async () => {
    const late = await queue({ priority: 5, minutesAgo: 1 });
    const early = await queue({ priority: 5, minutesAgo: 9 });
    const halt = await queue({ priority: 0 });
    const order = [await claimMail('w'), await claimMail('w'), await claimMail('w')].map((mail) => mail?.id);
    expect(order).toEqual([halt, early, late]);
  });

  it('hold for the lease, end with it, and the first worker can no longer write back', async () => {
    const id = await queue();
    const first = await claimMail('first');
    expect(first?.id).toBe(id);
    expect(await claimMail('second')).toBeNull();

    await endLease(id);
    const second = await claimMail('second');
    expect(second).toMatchObject({ id, attempts: 2, leaseOwner: 'second', messageId: first?.messageId });
    if (!first || !second) throw new Error('both claims were expected');
    expect(await markSent(first)).toBe(false);
    expect((await row(id)).state).toBe('queued');
    expect(await markSent(second)).toBe(true);
    expect((await row(id)).state).toBe('sent');
    expect((await row(id)).sentAt).not.toBeNull();
  });

  it('of the same worker again are told apart by their attempt', async () => {
    const id = await queue();
    const before = await claimMail('w');
    await endLease(id);
    const after = await claimMail('w');
    if (!before || !after) throw new Error('both claims were expected');
    expect(await markSent(before)).toBe(false);
    expect(await markSent(after)).toBe(true);
  });
});

describe('delivery', () => {
  it('does not send a mail whose cause no longer holds', async () => {
    const id = await queue();
    const sent: string[] = [];
    await drain(delivery('w', sent, { stillHolds: () => Promise.resolve(false) }));
    expect(sent).toEqual([]);
    expect((await row(id)).state).toBe('overtaken');
  });

  it('keeps a mail however long the mail server is away, with a pause that grows', async () => {
    const id = await queue();
    const away = delivery('w', [], {
      send: () => Promise.reject(new MailServerUnavailableError(new Error('connection refused'))),
    });
    const pauses: number[] = [];
    for (let attempt = 1; attempt <= MOST_REFUSALS + 4; attempt += 1) {
      expect(await deliverNextMail(away)).toBe('unavailable');
      expect(await deliverNextMail(away)).toBe('idle');
      const [{ seconds }] = await database.asOwner<[{ seconds: number }]>((owner) =>
        owner.query('SELECT TIMESTAMPDIFF(SECOND, UTC_TIMESTAMP(6), next_attempt_at) AS seconds FROM outbox'),
      );
      pauses.push(Number(seconds));
      await endPause();
    }
    const mail = await row(id);
    expect(mail.state).toBe('queued');
    expect(mail.lastError).toBe('connection refused');
    expect(pauses[0]).toBeLessThanOrEqual(5);
    expect(pauses[1]).toBeGreaterThan(pauses[0] ?? 0);
    expect(Math.max(...pauses)).toBeLessThanOrEqual(600);

    const sent: string[] = [];
    await drain(delivery('w', sent));
    expect(sent).toEqual([mail.messageId]);
  });

  it('gives a mail up that the mail server itself refuses again and again', async () => {
    const id = await queue();
    const refusing = delivery('w', [], { send: () => Promise.reject(new Error('550 no such mailbox')) });
    for (let attempt = 1; attempt <= MOST_REFUSALS; attempt += 1) {
      expect((await row(id)).state).toBe('queued');
      expect(await deliverNextMail(refusing)).toBe('done');
      await endPause();
    }
    expect((await row(id)).state).toBe('dead');
    expect(await deliverNextMail(refusing)).toBe('idle');
  });

  it('wipes the token of a link once the mail was sent, overtaken or given up, and not before', async () => {
    const payload = { kind: 'invitation', token: 'a-secret', purpose: 'invitation' };
    const without = JSON.stringify({ kind: 'invitation', purpose: 'invitation' });
    const kept = async (id: string): Promise<unknown> => JSON.parse((await row(id)).payload);

    const sentMail = await queue({ payload });
    await drain(delivery('w', []));
    expect(await kept(sentMail)).toEqual(JSON.parse(without));

    const overtaken = await queue({ payload });
    await drain(delivery('w', [], { stillHolds: () => Promise.resolve(false) }));
    expect(await kept(overtaken)).toEqual(JSON.parse(without));

    const refused = await queue({ payload });
    const refusing = delivery('w', [], { send: () => Promise.reject(new Error('550 no such mailbox')) });
    for (let attempt = 1; attempt <= MOST_REFUSALS; attempt += 1) {
      expect(await kept(refused)).toEqual(payload);
      await deliverNextMail(refusing);
      await endPause();
    }
    expect(await kept(refused)).toEqual(JSON.parse(without));
  });

  it('cuts an error text to what the column takes', async () => {
    const id = await queue();
    const mail = await claimMail('w');
    if (!mail) throw new Error('a claim was expected');
    await markFailed(mail, 'x'.repeat(2_000), false);
    expect((await row(id)).lastError).toHaveLength(500);
  });
});
