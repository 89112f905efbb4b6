import { beforeAll, describe, expect, it } from 'vitest';
import { sequelize } from '@/lib/db/connection';
import { GRANTS } from '@/lib/db/grants';
import { inTransaction } from '@/lib/db/transaction';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});

/** Runs a statement as the application user and returns MariaDB's error number. */
async function errorNumber(sql: string): Promise<number | undefined> {
  try {
    await inTransaction(() => sequelize().query(sql));
    return undefined;
  } catch (error) {
    const parent = error instanceof Error && 'parent' in error ? error.parent : undefined;
    return parent instanceof Error && 'errno' in parent ? Number(parent.errno) : -1;
  }
}

// Error numbers of MariaDB's manual: 1142 table access denied, 1143 column access denied, 1644 SIGNAL.
const TABLE_DENIED = 1142;
const COLUMN_DENIED = 1143;
const SIGNALLED = 1644;

describe('rights of the application user', () => {
  it('are named for every table of the schema and no other', async () => {
    const tables: { name: string }[] = await database.asOwner((owner) =>
      owner.query(`SELECT TABLE_NAME AS name FROM information_schema.TABLES WHERE TABLE_SCHEMA = ?`, [
        database.name,
      ]),
    );
    expect(tables.map(({ name }) => name).sort()).toEqual(Object.keys(GRANTS).sort());
  });

  it('refuse to change, remove or empty the trail, and to touch any table', async () => {
    expect(await errorNumber(`UPDATE events SET hash = 'x'`)).toBe(TABLE_DENIED);
    expect(await errorNumber('DELETE FROM events')).toBe(TABLE_DENIED);
    expect(await errorNumber('TRUNCATE events')).toBe(TABLE_DENIED);
    expect(await errorNumber(`UPDATE event_payloads SET payload = '{}'`)).toBe(TABLE_DENIED);
    expect(await errorNumber('DROP TABLE events')).toBe(TABLE_DENIED);
    expect(await errorNumber('DROP TRIGGER events_refuse_update')).toBe(TABLE_DENIED);
    expect(await errorNumber('ALTER TABLE trials ADD COLUMN x INT')).toBe(TABLE_DENIED);
    expect(await errorNumber('TRUNCATE trials')).toBe(TABLE_DENIED);
    expect(await errorNumber('DELETE FROM releases')).toBe(TABLE_DENIED);
    expect(await errorNumber('UPDATE releases SET dose = 1')).toBe(TABLE_DENIED);
  });

  it('refuse to rewrite what was computed, signed or marked at creation', async () => {
    expect(await errorNumber('UPDATE recommendations SET dose = 1')).toBe(COLUMN_DENIED);
    expect(await errorNumber(`UPDATE recommendations SET record = '{}'`)).toBe(COLUMN_DENIED);
    expect(await errorNumber(`UPDATE signatures SET decision = 'release'`)).toBe(COLUMN_DENIED);
    expect(await errorNumber(`UPDATE installation SET kind = 'production'`)).toBe(COLUMN_DENIED);
    expect(await errorNumber(`INSERT INTO installation (id, kind) VALUES (1, 'test')`)).toBe(TABLE_DENIED);
  });

  it('cannot be got around by the owner either: the trail’s triggers refuse', async () => {
    const numbers = await database.asOwner(async (owner) => {
      await owner.query(
        `INSERT INTO events (id, chain, sequence, occurred_at, role, kind, payload_digest, previous_hash, hash)
         VALUES ('e', 'c', 1, NOW(), 'r', 'k', 'd', '', 'h')`,
      );
      const outcome = async (sql: string): Promise<unknown> =>
        owner.query(sql).then(
          () => 'done',
          (error: { errno: number }) => error.errno,
        );
      return [await outcome(`UPDATE events SET hash = 'x'`), await outcome('DELETE FROM events')];
    });
    expect(numbers).toEqual([SIGNALLED, SIGNALLED]);
  });
});
