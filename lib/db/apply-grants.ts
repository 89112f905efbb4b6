import * as mariadb from 'mariadb';
import { GRANTS, grantStatements, quoteAccount, quoteName } from './grants';

interface Privilege {
  table: string;
  privilege: string;
  /** The column a right is limited to; null for the whole table. */
  column: string | null;
}

/**
 * Gives the application user the rights of `GRANTS`, takes back rights on tables that it no longer has there,
 * and says which wider rights remain that only an operator can take away.
 * @param owner a connection of the owner, with GRANT OPTION on the database
 * @param application where and as whom the application connects
 * @returns warnings, one sentence each
 */
export async function applyGrants(
  owner: mariadb.Connection,
  application: mariadb.ConnectionConfig,
): Promise<string[]> {
  const databaseName = application.database;
  if (!databaseName) throw new Error('DATABASE_URL names no database.');
  const account = await applicationAccount(application);
  if ((await currentUser(owner)) === account) {
    return [
      'The application connects as the owner of the schema; give it a user of its own (README, deployment).',
    ];
  }
  for (const statement of grantStatements(databaseName, account)) await owner.query(statement);

  // With a database named, this connection needs the rights given above.
  const connection = await mariadb.createConnection(application);
  try {
    for (const excess of await excessPrivileges(connection, databaseName)) {
      const columns = excess.column === null ? '' : ` (${quoteName(excess.column)})`;
      await owner.query(
        `REVOKE ${excess.privilege}${columns} ON ${quoteName(databaseName)}.${quoteName(excess.table)}
         FROM ${quoteAccount(account)}`,
      );
    }
    return await widerRights(connection, databaseName);
  } finally {
    await connection.end();
  }
}

async function applicationAccount(application: mariadb.ConnectionConfig): Promise<string> {
  const { database: _database, ...withoutDatabase } = application;
  const connection = await mariadb.createConnection(withoutDatabase);
  try {
    return await currentUser(connection);
  } finally {
    await connection.end();
  }
}

async function currentUser(connection: mariadb.Connection): Promise<string> {
  const rows: { account: string }[] = await connection.query('SELECT CURRENT_USER() AS account');
  return rows[0]?.account ?? '';
}

/** The rights of one entry of `GRANTS`, as 'SELECT', 'INSERT', 'UPDATE:column' … */
function wantedRights(table: string): Set<string> {
  const wanted = new Set<string>();
  for (const [, privilege, columns] of (GRANTS[table] ?? '').matchAll(/([A-Z]+)(?:\s*\(([^)]*)\))?/g)) {
    if (!privilege) continue;
    if (columns === undefined) wanted.add(privilege);
    else for (const column of columns.split(',')) wanted.add(`${privilege}:${column.trim()}`);
  }
  return wanted;
}

async function excessPrivileges(connection: mariadb.Connection, databaseName: string): Promise<Privilege[]> {
  const rows: Privilege[] = await connection.query(
    `SELECT TABLE_NAME AS \`table\`, PRIVILEGE_TYPE AS privilege, NULL AS \`column\`
       FROM information_schema.TABLE_PRIVILEGES WHERE TABLE_SCHEMA = ?
     UNION ALL
     SELECT TABLE_NAME, PRIVILEGE_TYPE, COLUMN_NAME
       FROM information_schema.COLUMN_PRIVILEGES WHERE TABLE_SCHEMA = ?`,
    [databaseName, databaseName],
  );
  return rows.filter(({ table, privilege, column }) => {
    const wanted = wantedRights(table);
    return !wanted.has(column === null ? privilege : `${privilege}:${column}`) && privilege !== 'USAGE';
  });
}

async function widerRights(connection: mariadb.Connection, databaseName: string): Promise<string[]> {
  const rows: { privilege: string; scope: string }[] = await connection.query(
    `SELECT PRIVILEGE_TYPE AS privilege, 'every database' AS scope
       FROM information_schema.USER_PRIVILEGES WHERE PRIVILEGE_TYPE <> 'USAGE'
     UNION ALL
     SELECT PRIVILEGE_TYPE, 'the whole database'
       FROM information_schema.SCHEMA_PRIVILEGES WHERE ? LIKE TABLE_SCHEMA`,
    [databaseName],
  );
  if (rows.length === 0) return [];
  const list = rows.slice(0, 4).map(({ privilege, scope }) => `${privilege} on ${scope}`);
  return [
    `The application's database user has wider rights than it needs (${list.join(', ')}` +
      `${rows.length > list.length ? ', …' : ''}); take them back, it needs rights on single tables only.`,
  ];
}
