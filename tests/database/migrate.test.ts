import { beforeAll, describe, expect, it } from 'vitest';
import { applyGrants } from '@/lib/db/apply-grants';
import { connectorOptions, migrate, pendingMigrations } from '@/lib/db/migrate';
import { migrations } from '@/migrations';
import { createTestDatabase, type TestDatabase } from '../setup/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});

describe('migrations', () => {
  it('have all run, and run only once', async () => {
    expect(await pendingMigrations(database.url)).toEqual([]);
    const again = await migrate(database.ownerUrl, database.url, 'production');
    expect(again.ran).toEqual([]);
  });

  it('have names in order, each its own', () => {
    const names = migrations.map(({ name }) => name);
    expect(names).toEqual([...names].sort());
    expect(new Set(names).size).toBe(names.length);
  });

  it('leave the kind a database was created with, whatever a later start asks for', async () => {
    const again = await migrate(database.ownerUrl, database.url, 'production');
    expect(again.kind).toBe('test');
  });

  it('go on after a run that was killed between a statement and its note', async () => {
    const last = migrations.at(-1)?.name ?? '';
    await database.asOwner((owner) =>
      owner.query('UPDATE migrations SET finished_at = NULL WHERE name = ?', [last]),
    );
    const again = await migrate(database.ownerUrl, database.url, 'test');
    expect(again.ran).toEqual([last]);
    expect(await pendingMigrations(database.url)).toEqual([]);
  });

  it('fail when a table stands in the way that no migration made', async () => {
    const last = migrations.at(-1)?.name ?? '';
    await database.asOwner((owner) => owner.query('DELETE FROM migrations WHERE name = ?', [last]));
    await expect(migrate(database.ownerUrl, database.url, 'test')).rejects.toThrow(/already exists/);
    await database.asOwner((owner) =>
      owner.query('UPDATE migrations SET finished_at = NOW() WHERE name = ?', [last]),
    );
  });
});

describe('rights', () => {
  it('that were given by hand are taken back from single tables, and wider ones are told', async () => {
    await database.asOwner((owner) =>
      owner.query(`GRANT DELETE ON \`${database.name}\`.events TO stepwell_test_app@127.0.0.1`),
    );
    await database.asOwner((owner) => applyGrants(owner, connectorOptions(database.url)));
    const left: unknown[] = await database.asOwner((owner) =>
      owner.query(
        `SELECT 1 FROM information_schema.TABLE_PRIVILEGES
         WHERE TABLE_SCHEMA = ? AND TABLE_NAME = 'events' AND PRIVILEGE_TYPE = 'DELETE'
           AND GRANTEE LIKE '%stepwell_test_app%'`,
        [database.name],
      ),
    );
    expect(left).toEqual([]);

    const account = 'stepwell_test_app@127.0.0.1';
    await database.asOwner((owner) => owner.query(`GRANT DELETE ON \`${database.name}\`.* TO ${account}`));
    const warnings = await database.asOwner((owner) => applyGrants(owner, connectorOptions(database.url)));
    expect(warnings.join()).toContain('DELETE on the whole database');
  });
});
