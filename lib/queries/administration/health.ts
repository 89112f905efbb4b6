import { QueryTypes } from 'sequelize';
import { INSTALLATION_CHAIN } from '@/lib/conduct/chain';
import { sequelize } from '@/lib/db/connection';
import { type MigrationState, migrationState } from '@/lib/db/migration-state';
import { type ChainVerdict, verifyStoredChain } from '../verify-chain';

/** How the installation is. */
export interface InstallationHealth {
  readonly database: { readonly version: string; readonly answeredInMilliseconds: number };
  readonly kind: 'production' | 'demo' | 'test';
  readonly migrations: MigrationState;
  /** When the worker last claimed or sent a mail; null when it never did. */
  readonly workerLastActiveAt: string | null;
  /** The mail that has waited longest although it may be sent now; null when none waits. */
  readonly oldestDueMailAt: string | null;
  /** The database's clock when it was asked. */
  readonly databaseTime: string;
  readonly trail: ChainVerdict;
}

interface HealthRow {
  version: string;
  databaseTime: Date;
  kind: InstallationHealth['kind'];
  lastSentAt: Date | null;
  lastLeaseUntil: Date | null;
  oldestDueMailAt: Date | null;
}

/** A claimed mail belongs to its worker this long (lib/worker/outbox.ts); a lease tells when it began. */
const LEASE_MILLISECONDS = 120_000;

/** Reads the state of database, migrations, worker and the installation's trail: three statements. */
export async function installationHealth(): Promise<InstallationHealth> {
  const began = performance.now();
  const rows = await sequelize().query<HealthRow>(
    `SELECT VERSION() AS version, UTC_TIMESTAMP(3) AS databaseTime, i.kind,
       (SELECT MAX(sent_at) FROM outbox) AS lastSentAt,
       (SELECT MAX(lease_until) FROM outbox) AS lastLeaseUntil,
       (SELECT MIN(COALESCE(next_attempt_at, created_at)) FROM outbox WHERE state = 'queued'
         AND (next_attempt_at IS NULL OR next_attempt_at <= UTC_TIMESTAMP(6))
         AND (lease_until IS NULL OR lease_until < UTC_TIMESTAMP(6))) AS oldestDueMailAt
     FROM installation i WHERE i.id = 1`,
    { type: QueryTypes.SELECT },
  );
  const answeredInMilliseconds = performance.now() - began;
  const row = rows[0];
  if (row === undefined)
    throw new Error('The database has no installation row; it was not migrated to its end.');
  const migrations = await migrationState();
  const trail = await verifyStoredChain(INSTALLATION_CHAIN);
  if (trail === null) throw new Error('The installation has no chain.');
  const active = [
    row.lastSentAt?.getTime(),
    row.lastLeaseUntil === null ? undefined : row.lastLeaseUntil.getTime() - LEASE_MILLISECONDS,
  ].filter((time) => time !== undefined);
  return {
    database: { version: row.version, answeredInMilliseconds },
    kind: row.kind,
    migrations,
    workerLastActiveAt: active.length === 0 ? null : new Date(Math.max(...active)).toISOString(),
    oldestDueMailAt: row.oldestDueMailAt?.toISOString() ?? null,
    databaseTime: row.databaseTime.toISOString(),
    trail,
  };
}
