/*
 * Verifies every chain of the trail: npm run verify-trail. Prints one line a chain; ends with 1 when a chain is
 * broken, with 2 when it could not be read.
 */
import { BREAK_WORDS } from '@/lib/conduct/chain';
import { closeDatabase } from '@/lib/db/connection';
import { type ChainVerdict, verifyEveryChain } from '@/lib/queries/verify-chain';

function lineOf({ name, events, firstBreak, head }: ChainVerdict): string {
  if (firstBreak === null) {
    return `${name}: whole, ${events} event${events === 1 ? '' : 's'}${head ? `, head ${head}` : ''}`;
  }
  const event = firstBreak.eventId === null ? '' : ` (event ${firstBreak.eventId})`;
  return `${name}: BROKEN at ${firstBreak.sequence}${event}. ${BREAK_WORDS[firstBreak.reason]}`;
}

try {
  let broken = 0;
  let chains = 0;
  for await (const verdict of verifyEveryChain()) {
    chains += 1;
    if (verdict.firstBreak !== null) broken += 1;
    console.log(lineOf(verdict));
  }
  console.log(broken === 0 ? `All ${chains} chains are whole.` : `${broken} of ${chains} chains are broken.`);
  if (broken > 0) process.exitCode = 1;
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 2;
} finally {
  await closeDatabase();
}
