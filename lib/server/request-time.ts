import 'server-only';
import { connection } from 'next/server';
import { cache } from 'react';

/** The server's clock at this request, in milliseconds since 1970: one time for everything on a page. */
export const requestTime = cache(async (): Promise<number> => {
  await connection();
  return Date.now();
});
