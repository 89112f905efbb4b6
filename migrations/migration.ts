/** What a migration may use: one statement at a time, run as the owner of the schema. */
export interface MigrationContext {
  query(sql: string): Promise<void>;
}

/**
 * One forward step of the schema: one DDL statement, since MariaDB commits each of them on its own.
 * A migration that has run anywhere outside tests is never edited; the next one mends it.
 */
export interface Migration {
  readonly name: string;
  up(context: MigrationContext): Promise<void>;
}
