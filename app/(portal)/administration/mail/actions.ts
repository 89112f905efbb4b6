'use server';

import { retryMailAction } from '@/lib/server/administration-actions';

/** Queues a given-up mail again. */
export async function retryMail(input: Parameters<typeof retryMailAction>[0]) {
  return retryMailAction(input);
}
