import { QueryTypes } from 'sequelize';
import { migrations } from '@/migrations';
import { sequelize } from './connection';

/** How the schema of the database stands to what this code knows. */
export interface MigrationState {
  readonly ran: number;
  readonly lastName: string | null;
  readonly lastRanAt: string | null;
  /** Names this code knows and the database has not run to their end. */
  readonly pending: readonly string[];
  /** Names the database has run and this code does not know: the code is older than the database. */
  readonly unknown: readonly string[];
}

/** Reads the state of the migrations over the process's own pool, in one statement. */
export async function migrationState(): Promise<MigrationState> {
  const rows = await sequelize().query<{ name: string; ranAt: Date }>(
    'SELECT name, finished_at AS ranAt FROM migrations WHERE finished_at IS NOT NULL ORDER BY name',
    { type: QueryTypes.SELECT },
  );
  const known = new Set(migrations.map(({ name }) => name));
  const ran = new Set(rows.map(({ name }) => name));
  const last = rows.at(-1);
  return {
    ran: ran.size,
    lastName: last?.name ?? null,
    lastRanAt: last?.ranAt.toISOString() ?? null,
    pending: [...known].filter((name) => !ran.has(name)),
    unknown: [...ran].filter((name) => !known.has(name)),
  };
}
