import * as mariadb from 'mariadb';
import { Umzug, type UmzugStorage } from 'umzug';
import { migrations } from '@/migrations';
import type { Migration, MigrationContext } from '@/migrations/migration';
import { applyGrants } from './apply-grants';

export type InstallationKind = 'production' | 'demo' | 'test';

export interface MigrationRun {
  /** Names of the migrations that ran now, in order. */
  readonly ran: readonly string[];
  /** What the database says it was created as. */
  readonly kind: InstallationKind;
  /** Rights of the application user that go beyond lib/db/grants.ts, as sentences; empty when all is well. */
  readonly warnings: readonly string[];
}

const LOCK_NAME = 'stepwell-migrate';
const NOT_IN_A_CLUSTER = 1235;

/**
 * Brings a database to the newest schema as its owner, marks a new one with its kind, and gives the application
 * user its rights table by table. Runs in one process at a time.
 * @param ownerUrl the owner's address: may create tables, triggers and grants
 * @param applicationUrl the application user's address of the same database
 * @param kindOfNew the kind a database gets when it has none yet; a database that has one keeps it
 * @throws Error when a migration fails: those before it stay (MariaDB commits each), the run can be repeated
 */
export async function migrate(
  ownerUrl: string,
  applicationUrl: string,
  kindOfNew: InstallationKind,
): Promise<MigrationRun> {
  const owner = await mariadb.createConnection(connectorOptions(ownerUrl));
  try {
    await takeLock(owner);
    const ran = await runPending(owner);
    await owner.query('INSERT IGNORE INTO installation (id, kind) VALUES (1, ?)', [kindOfNew]);
    const rows: { kind: InstallationKind }[] = await owner.query(
      'SELECT kind FROM installation WHERE id = 1',
    );
    const kind = rows[0]?.kind;
    if (!kind) throw new Error('The installation row could not be made.');
    const warnings = await applyGrants(owner, connectorOptions(applicationUrl));
    return { ran, kind, warnings };
  } finally {
    await owner.end();
  }
}

/**
 * The names of migrations this code knows and the database has not run: for a server that holds no owner's
 * address and may only check.
 */
export async function pendingMigrations(applicationUrl: string): Promise<string[]> {
  const connection = await mariadb.createConnection(connectorOptions(applicationUrl));
  try {
    const executed = new Set(await executedNames(connection));
    return migrations.map(({ name }) => name).filter((name) => !executed.has(name));
  } finally {
    await connection.end();
  }
}

/** MariaDB's numbers for "that exists already": table, column, key, trigger, constraint. */
const EXISTS_ALREADY = new Set([1050, 1060, 1061, 1359, 1826]);

/**
 * Runs what has not run. Each migration is noted before and after its one statement: MariaDB keeps a statement
 * whole or not at all but commits it apart from our note, so that a run killed in between is known by its half note.
 */
async function runPending(owner: mariadb.Connection): Promise<string[]> {
  await owner.query(
    `CREATE TABLE IF NOT EXISTS migrations (
       name VARCHAR(160) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
       started_at DATETIME(3) NOT NULL DEFAULT UTC_TIMESTAMP(3),
       finished_at DATETIME(3) NULL
     )`,
  );
  const umzug = new Umzug({
    migrations: migrations.map((migration) => ({
      name: migration.name,
      up: () => runNoted(owner, migration),
    })),
    storage: storage(owner),
    context: {},
    logger: undefined,
  });
  return (await umzug.up()).map(({ name }) => name);
}

async function runNoted(owner: mariadb.Connection, migration: Migration): Promise<void> {
  const context: MigrationContext = {
    query: async (sql) => {
      await owner.query(sql);
    },
  };
  const noted: { affectedRows: number } = await owner.query(
    'INSERT IGNORE INTO migrations (name) VALUES (?)',
    [migration.name],
  );
  const wasStarted = noted.affectedRows === 0;
  try {
    await migration.up(context);
  } catch (error) {
    const isDone = wasStarted && error instanceof mariadb.SqlError && EXISTS_ALREADY.has(error.errno);
    if (isDone) return;
    if (!wasStarted) await owner.query('DELETE FROM migrations WHERE name = ?', [migration.name]);
    throw error;
  }
}

function storage(owner: mariadb.Connection): UmzugStorage {
  return {
    executed: () => executedNames(owner),
    logMigration: async ({ name }) => {
      await owner.query('UPDATE migrations SET finished_at = UTC_TIMESTAMP(3) WHERE name = ?', [name]);
    },
    unlogMigration: () => Promise.reject(new Error('Migrations go forward only.')),
  };
}

async function executedNames(connection: mariadb.Connection): Promise<string[]> {
  const rows: { name: string }[] = await connection.query(
    'SELECT name FROM migrations WHERE finished_at IS NOT NULL ORDER BY name',
  );
  return rows.map(({ name }) => name);
}

/** One process at a time; a cluster has no such lock, and there the operator runs one process (README, deployment). */
async function takeLock(owner: mariadb.Connection): Promise<void> {
  try {
    const rows: { taken: number | bigint | null }[] = await owner.query('SELECT GET_LOCK(?, 60) AS taken', [
      LOCK_NAME,
    ]);
    if (Number(rows[0]?.taken) !== 1)
      throw new Error('Another process is migrating this database; try again.');
  } catch (error) {
    if (error instanceof mariadb.SqlError && error.errno === NOT_IN_A_CLUSTER) return;
    throw error;
  }
}

/** A database address as the connector takes it. */
export function connectorOptions(url: string): mariadb.ConnectionConfig {
  const address = new URL(url);
  return {
    host: address.hostname,
    port: Number(address.port || 3306),
    user: decodeURIComponent(address.username),
    password: decodeURIComponent(address.password),
    database: decodeURIComponent(address.pathname.slice(1)),
    timezone: 'Z',
    connectTimeout: 5_000,
    logParam: false,
  };
}
