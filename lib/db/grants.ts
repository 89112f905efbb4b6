/**
 * What the application user may do, table by table. There is no right to DROP, TRUNCATE, ALTER or to touch a
 * trigger anywhere: a TRUNCATE or a cascade would pass the triggers that keep the trail append-only.
 * A test compares this list with the tables of a migrated database: a new table is named here or fails.
 */
export const GRANTS: Readonly<Record<string, string>> = {
  people: 'SELECT, INSERT, UPDATE',
  sessions: 'SELECT, INSERT, UPDATE, DELETE',
  one_time_links: 'SELECT, INSERT, UPDATE',
  sign_in_attempts: 'SELECT, INSERT, DELETE',
  // The kind of an installation is written once, by the owner.
  installation:
    'SELECT, UPDATE (clock_offset_milliseconds, version, chain_sequence, chain_head, chain_time, demo_loaded_at)',
  demo_accounts: 'SELECT, INSERT',
  sites: 'SELECT, INSERT, UPDATE',
  trials: 'SELECT, INSERT, UPDATE',
  trial_sites: 'SELECT, INSERT, UPDATE',
  memberships: 'SELECT, INSERT, UPDATE',
  membership_sites: 'SELECT, INSERT, DELETE',
  design_versions: 'SELECT, INSERT, UPDATE',
  // What was computed, and what was signed, is never written again; only its state moves on.
  recommendations: 'SELECT, INSERT, UPDATE (state)',
  releases: 'SELECT, INSERT',
  cohorts: 'SELECT, INSERT, UPDATE (state, is_records_only, is_closed_short, completed_at)',
  subjects: 'SELECT, INSERT, UPDATE',
  halts: 'SELECT, INSERT, UPDATE (lifted_at)',
  signatures: 'SELECT, INSERT, UPDATE (is_standing)',
  events: 'SELECT, INSERT',
  event_payloads: 'SELECT, INSERT',
  submissions: 'SELECT, INSERT',
  outbox: 'SELECT, INSERT, UPDATE',
  caught_mails: 'SELECT, INSERT',
  migrations: 'SELECT',
};

/**
 * The statements that give the application user exactly `GRANTS` on one database.
 * @param databaseName the schema's name
 * @param account the application user as MariaDB names it, 'user@host' (CURRENT_USER())
 */
export function grantStatements(databaseName: string, account: string): string[] {
  const quoted = quoteAccount(account);
  return Object.entries(GRANTS).map(
    ([table, privileges]) =>
      `GRANT ${privileges} ON ${quoteName(databaseName)}.${quoteName(table)} TO ${quoted}`,
  );
}

/** A name as SQL takes it, with backticks. */
export function quoteName(name: string): string {
  return `\`${name.replaceAll('`', '``')}\``;
}

/** An account as SQL takes it: 'user'@'host'. Throws on one without a host. */
export function quoteAccount(account: string): string {
  const at = account.lastIndexOf('@');
  if (at < 1) throw new Error(`“${account}” is not a database account (user@host).`);
  const quote = (text: string): string => `'${text.replaceAll('\\', '\\\\').replaceAll("'", "''")}'`;
  return `${quote(account.slice(0, at))}@${quote(account.slice(at + 1))}`;
}
