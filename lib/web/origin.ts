import 'server-only';
import { headers } from 'next/headers';

/** Where the request for this page came from, as far as the proxy in front vouches for it. */
export async function pageOrigin(): Promise<string> {
  return (await headers()).get('x-forwarded-for')?.split(',').at(-1)?.trim() ?? 'unknown';
}
