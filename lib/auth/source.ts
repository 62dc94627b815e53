import { env } from '@/lib/env';

/** What stands for a source that nobody vouches for. */
export const unknownSource = 'direct';

/**
 * Where a request came from, for limits on tries. Whoever asks can write an X-Forwarded-For of their own; only what
 * our own proxies added at its end is true, and how many of them there are is a setting (TRUSTED_PROXIES, none by default).
 */
export function sourceOf(forwardedFor: string | null | undefined): string {
  const proxies = env().TRUSTED_PROXIES;
  if (proxies === 0) return unknownSource;
  const address = (forwardedFor ?? '').split(',').at(-proxies)?.trim();
  return address && address.length <= 64 ? address : unknownSource;
}
