import { QueryTypes } from 'sequelize';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { models, sequelize } from '@/lib/db/connection';
import { WriteOutsideTransactionError } from '@/lib/db/guard-writes';
import { inTransaction, OutcomeUnknownError } from '@/lib/db/transaction';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});

const FIRST = '00000000-0000-4000-8000-000000000001';
const SECOND = '00000000-0000-4000-8000-000000000002';

beforeEach(async () => {
  await database.asOwner(async (owner) => {
    await owner.query('DELETE FROM sites');
    await owner.query(
      `INSERT INTO sites (id, code, name, time_zone, created_at)
       VALUES (?, 'A', 'first', 'UTC', NOW()), (?, 'B', 'second', 'UTC', NOW())`,
      [FIRST, SECOND],
    );
  });
});

async function nameOf(id: string): Promise<string> {
  const site = await models().Site.findByPk(id, { rejectOnEmpty: true });
  return site.name;
}

async function appendTo(id: string, text: string): Promise<void> {
  await sequelize().query('UPDATE sites SET name = CONCAT(name, :text) WHERE id = :id', {
    type: QueryTypes.UPDATE,
    replacements: { id, text },
  });
}

async function connectionNumber(): Promise<number> {
  const rows = await sequelize().query<{ id: number }>('SELECT CONNECTION_ID() AS id', {
    type: QueryTypes.SELECT,
  });
  return Number(rows[0]?.id);
}

const tick = (milliseconds: number): Promise<void> =>
  new Promise((resolve) => setTimeout(resolve, milliseconds));

describe('inTransaction', () => {
  it('keeps what the work wrote, and nothing when the work throws', async () => {
    await inTransaction(() => appendTo(FIRST, '+kept'));
    await expect(
      inTransaction(async () => {
        await appendTo(FIRST, '+lost');
        throw new Error('refused');
      }),
    ).rejects.toThrow('refused');
    expect(await nameOf(FIRST)).toBe('first+kept');
  });

  it('runs at READ COMMITTED: a read after another commit sees it', async () => {
    await inTransaction(async () => {
      expect(await nameOf(FIRST)).toBe('first');
      await database.asOwner((owner) =>
        owner.query(`UPDATE sites SET name = 'changed' WHERE id = ?`, [FIRST]),
      );
      expect(await nameOf(FIRST)).toBe('changed');
    });
  });

  it('runs the whole work again after a real deadlock, and both works are kept once', async () => {
    let runs = 0;
    let bothHoldTheirFirst: () => void = () => undefined;
    const meeting = new Promise<void>((resolve) => (bothHoldTheirFirst = resolve));
    let holding = 0;
    const work = (first: string, second: string, text: string) => async (): Promise<void> => {
      runs += 1;
      await appendTo(first, text);
      holding += 1;
      if (holding === 2) bothHoldTheirFirst();
      await meeting;
      await appendTo(second, text);
    };
    await Promise.all([inTransaction(work(FIRST, SECOND, '+a')), inTransaction(work(SECOND, FIRST, '+b'))]);
    expect(runs).toBe(3);
    for (const id of [FIRST, SECOND]) {
      const name = await nameOf(id);
      expect(name.match(/\+a/g)).toHaveLength(1);
      expect(name.match(/\+b/g)).toHaveLength(1);
    }
  });

  it('runs again after a lock wait timeout (1205)', async () => {
    let runs = 0;
    let release: () => void = () => undefined;
    const held = new Promise<void>((resolve) => (release = resolve));
    const holder = inTransaction(async () => {
      await appendTo(FIRST, '+holder');
      await held;
    });
    await tick(100);
    const waiter = inTransaction(async () => {
      runs += 1;
      await sequelize().query('SET SESSION innodb_lock_wait_timeout = 1');
      if (runs === 2) release();
      await appendTo(FIRST, '+waiter');
    });
    await Promise.all([holder, waiter]);
    expect(runs).toBeGreaterThanOrEqual(2);
    expect(await nameOf(FIRST)).toBe('first+holder+waiter');
  });

  it('runs again on a new connection when the connection was killed in the middle', async () => {
    let runs = 0;
    await inTransaction(async () => {
      runs += 1;
      await appendTo(FIRST, '+once');
      if (runs === 1) {
        const id = await connectionNumber();
        await database.asOwner((owner) => owner.query(`KILL CONNECTION ${id}`));
        await tick(50);
      }
      await appendTo(SECOND, '+once');
    });
    expect(runs).toBe(2);
    expect(await nameOf(FIRST)).toBe('first+once');
    expect(await nameOf(SECOND)).toBe('second+once');
  });

  it('does not run again when the commit itself was lost, unless the work may be repeated', async () => {
    let runs = 0;
    const workThatLosesItsCommit = async (): Promise<void> => {
      runs += 1;
      await appendTo(FIRST, '+maybe');
      if (runs > 1) return;
      const id = await connectionNumber();
      await database.asOwner((owner) => owner.query(`KILL CONNECTION ${id}`));
      await tick(50);
    };
    await expect(inTransaction(workThatLosesItsCommit)).rejects.toThrow(OutcomeUnknownError);
    expect(runs).toBe(1);
    runs = 0;
    await inTransaction(workThatLosesItsCommit, { repeatable: true });
    expect(runs).toBe(2);
  });

  it('gives up after the allowed attempts with the database error', async () => {
    let runs = 0;
    const conflict = Object.assign(new Error('conflict'), { parent: { errno: 1213 } });
    await expect(
      inTransaction(
        () => {
          runs += 1;
          return Promise.reject(conflict);
        },
        { attempts: 3 },
      ),
    ).rejects.toBe(conflict);
    expect(runs).toBe(3);
  });

  it('loses no update of forty that add to one row at once', async () => {
    await Promise.all(Array.from({ length: 40 }, () => inTransaction(() => appendTo(FIRST, '.'))));
    expect(await nameOf(FIRST)).toBe(`first${'.'.repeat(40)}`);
  });

  it('refuses to start inside another one', async () => {
    await expect(inTransaction(() => inTransaction(() => appendTo(FIRST, '+x')))).rejects.toThrow(
      'inside a transaction',
    );
  });
});

describe('writes outside a transaction', () => {
  it('are refused for models and raw statements alike, and change nothing', async () => {
    const site = await models().Site.findByPk(FIRST, { rejectOnEmpty: true });
    await expect(site.update({ name: 'x' })).rejects.toThrow(WriteOutsideTransactionError);
    await expect(models().Site.update({ name: 'x' }, { where: { id: FIRST } })).rejects.toThrow(
      WriteOutsideTransactionError,
    );
    await expect(
      models().Site.bulkCreate([{ id: 'x', code: 'C', name: 'x', timeZone: 'UTC', createdAt: new Date() }]),
    ).rejects.toThrow(WriteOutsideTransactionError);
    await expect(appendTo(FIRST, '+x')).rejects.toThrow(WriteOutsideTransactionError);
    await expect(sequelize().query('  insert INTO sites (id) VALUES (1)')).rejects.toThrow(
      WriteOutsideTransactionError,
    );
    expect(await nameOf(FIRST)).toBe('first');
  });
});
