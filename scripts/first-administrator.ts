/*
 * Prints a new single-use link for the first administrator: npm run first-administrator.
 * Nothing is made where an administrator exists.
 */
import { makeFirstAdministratorLink } from '@/lib/commands/first-administrator-link';
import { closeDatabase } from '@/lib/db/connection';
import { environment } from '@/lib/env';

try {
  const link = await makeFirstAdministratorLink(environment().url);
  console.log(link ?? 'There is an administrator already; they invite everyone else.');
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
} finally {
  await closeDatabase();
}
