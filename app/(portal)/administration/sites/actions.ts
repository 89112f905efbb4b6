'use server';

import { createSiteAction } from '@/lib/server/administration-actions';

/** Creates a site. */
export async function createSite(input: Parameters<typeof createSiteAction>[0]) {
  return createSiteAction(input);
}
