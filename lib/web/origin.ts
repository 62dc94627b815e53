import 'server-only';
import { headers } from 'next/headers';
import { sourceOf } from '@/lib/auth/source';

/** Where the request for this page came from, as far as our own proxies vouch for it. */
export async function pageOrigin(): Promise<string> {
  return sourceOf((await headers()).get('x-forwarded-for'));
}
