import 'server-only';
import type { NextAuthOptions } from 'next-auth';
import Credentials from 'next-auth/providers/credentials';
import { env } from '@/lib/env';
import { log } from '@/lib/log';
import { sourceOf } from './source';
import { endSession, openSession, sessionSeconds, verifySignIn } from './sign-in';

/** What the cookie carries: a random session token and nothing else. The data base is asked each time. */
declare module 'next-auth/jwt' {
  interface JWT {
    sid?: string;
  }
}

const forwardedFor = (headers: Record<string, unknown> | undefined): string | null => {
  const forwarded = headers?.['x-forwarded-for'];
  return typeof forwarded === 'string' ? forwarded : null;
};

/** The only words that reach the browser from here; anything else is one plain refusal. */
async function authorise(credentials: { email?: string; password?: string } | undefined, headers: Record<string, unknown> | undefined) {
  if (!credentials?.email || !credentials.password || credentials.password.length > 256) return null;
  let account: string | null;
  try {
    account = await verifySignIn({ email: credentials.email, password: credentials.password, from: sourceOf(forwardedFor(headers)) });
  } catch (error) {
    log().error({ code: (error as { code?: unknown }).code ?? 'fault', at: 'sign-in' });
    return null;
  }
  if (account === 'too-many') throw new Error('too-many');
  return account === null ? null : { id: account };
}

/**
 * next-auth, kept to what it is good at: the form's double-submit token and the cookie.
 * @param before the session that this browser's cookie holds; signing in anew ends it.
 */
export const authOptions = (before: string | null = null): NextAuthOptions => ({
  secret: env().NEXTAUTH_SECRET,
  session: { strategy: 'jwt', maxAge: sessionSeconds },
  pages: { signIn: '/sign-in', error: '/sign-in' },
  providers: [
    Credentials({
      credentials: { email: { type: 'email' }, password: { type: 'password' } },
      authorize: (credentials, request) => authorise(credentials, request.headers),
    }),
  ],
  callbacks: {
    jwt: async ({ token, user, trigger }) => {
      // 'update' brings data chosen by the browser: nothing of it is taken.
      if (trigger !== 'signIn') return token;
      if (before) await endSession(before);
      return { sid: await openSession(user.id), sub: user.id };
    },
    session: ({ session }) => ({ expires: session.expires }),
  },
  events: { signOut: async ({ token }) => (token.sid ? endSession(token.sid) : undefined) },
  logger: {
    error: (code) => log().error({ code, at: 'next-auth' }),
    warn: (code) => log().warn({ code, at: 'next-auth' }),
    debug: () => undefined,
  },
});
