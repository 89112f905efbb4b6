/*
 * Makes a database ready to serve: schema, rights, its kind, the demo or the first administrator's link. Run by
 * the start script: node --import tsx scripts/prepare-database.ts <kind> <private|given>. What people should
 * read on the way goes to standard error; the last line of standard output is the result as JSON.
 */
import * as mariadb from 'mariadb';
import { z } from 'zod';
import { makeFirstAdministratorLink } from '@/lib/commands/first-administrator-link';
import { closeDatabase, models } from '@/lib/db/connection';
import { connectorOptions, migrate, pendingMigrations, type InstallationKind } from '@/lib/db/migrate';
import { quoteName } from '@/lib/db/grants';
import { inTransaction } from '@/lib/db/transaction';
import { isLostConnection } from '@/lib/db/transient-errors';
import { environment } from '@/lib/env';
import { loadDemo } from './demo/load';

/** What the start script prints for people. */
interface Prepared {
  kind: InstallationKind;
  accounts: { email: string; password: string; description: string }[];
  firstAdministratorLink: string | null;
  warnings: readonly string[];
}

const [kindArgument, place] = process.argv.slice(2);
const kindOfNew = z.enum(['production', 'demo', 'test']).parse(kindArgument);
const isPrivate = place === 'private';

async function main(): Promise<Prepared> {
  const { databaseOwnerUrl, databaseUrl } = environment();
  const warnings: string[] = [];
  if (databaseOwnerUrl) {
    warnings.push(...(await migrate(databaseOwnerUrl, databaseUrl, kindOfNew)).warnings);
  } else {
    await refusePendingMigrations(databaseUrl);
  }

  let kind = await installationKind();
  if (kind === 'demo' && !(await demoIsLoaded())) {
    if (await hasPeople()) kind = await startDemoOver();
    await loadDemoTrials();
  }
  return {
    kind,
    accounts: kind === 'demo' ? await demoAccounts() : [],
    firstAdministratorLink:
      kind === 'production' ? await makeFirstAdministratorLink(environment().url) : null,
    warnings,
  };
}

async function refusePendingMigrations(databaseUrl: string): Promise<void> {
  const pending = await pendingMigrations(databaseUrl);
  if (pending.length === 0) return;
  throw new Error(
    `The database lacks ${pending.length} migration${pending.length === 1 ? '' : 's'} (the first is ${pending[0]}). ` +
      'Start once with DATABASE_OWNER_URL, the address of the user that owns the schema.',
  );
}

async function installationKind(): Promise<InstallationKind> {
  const installation = await models().Installation.findByPk(1, { rejectOnEmpty: true });
  return installation.kind;
}

async function demoIsLoaded(): Promise<boolean> {
  const installation = await models().Installation.findByPk(1, { rejectOnEmpty: true });
  return installation.demoLoadedAt !== null;
}

async function hasPeople(): Promise<boolean> {
  return (await models().Person.findOne({ attributes: ['id'] })) !== null;
}

/** A start that was killed while it loaded the demo left a part of it; nobody has used that database yet. */
async function startDemoOver(): Promise<InstallationKind> {
  const { databaseOwnerUrl, databaseUrl } = environment();
  if (!isPrivate || !databaseOwnerUrl) {
    throw new Error('The demo was loaded only in part. Empty the database and start again.');
  }
  console.error('An earlier start was ended while it loaded the demo; the demo is loaded anew.');
  await closeDatabase();
  const { database, ...withoutDatabase } = connectorOptions(databaseOwnerUrl);
  const owner = await mariadb.createConnection(withoutDatabase);
  const name = quoteName(database ?? '');
  try {
    await owner.query(`DROP DATABASE ${name}`);
    await owner.query(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`);
  } finally {
    await owner.end();
  }
  return (await migrate(databaseOwnerUrl, databaseUrl, 'demo')).kind;
}

async function loadDemoTrials(): Promise<void> {
  console.error('Loading the demo trials …');
  await loadDemo();
  await inTransaction(async () => {
    await models().Installation.update(
      { demoLoadedAt: new Date() },
      { where: { id: 1, demoLoadedAt: null } },
    );
  });
}

async function demoAccounts(): Promise<Prepared['accounts']> {
  const accounts = await models().DemoAccount.findAll({ order: [['position', 'ASC']] });
  const people = await models().Person.findAll({ where: { id: accounts.map(({ personId }) => personId) } });
  const emails = new Map(people.map(({ id, email }) => [id, email]));
  return accounts.map(({ personId, password, description }) => ({
    email: emails.get(personId) ?? '',
    password,
    description,
  }));
}

function inWords(error: unknown): string {
  const text = error instanceof Error ? error.message : String(error);
  if (!isLostConnection(error)) return text;
  const { host, pathname } = new URL(environment().databaseUrl);
  return `The database ${pathname.slice(1)} at ${host} does not answer: ${text}`;
}

try {
  const prepared = await main();
  console.log(JSON.stringify(prepared));
} catch (error) {
  console.error(inWords(error));
  process.exitCode = 1;
} finally {
  await closeDatabase();
}
