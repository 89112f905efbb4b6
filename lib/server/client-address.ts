import 'server-only';
import { headers } from 'next/headers';

/**
 * The network address a request came from, as the nearest proxy (or, without one, the web server) noted it; at most
 * 64 characters. Only for back-off and the log: it authorises nothing.
 */
export async function clientAddress(): Promise<string> {
  return addressIn((await headers()).get('x-forwarded-for'));
}

/** The last entry of an `X-Forwarded-For` header: the one the nearest proxy wrote itself. */
export function addressIn(forwardedFor: string | null | undefined): string {
  const last = forwardedFor?.split(',').at(-1)?.trim() ?? '';
  return /^[0-9a-f.:]{2,64}$/i.test(last) ? last.toLowerCase() : 'unknown';
}
