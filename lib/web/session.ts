import 'server-only';
import { cache } from 'react';
import { cookies } from 'next/headers';
import { forbidden, notFound, redirect } from 'next/navigation';
import type { NextRequest } from 'next/server';
import { getToken } from 'next-auth/jwt';
import { may, type Act } from '@/lib/auth/policy';
import type { Actor } from '@/lib/auth/roles';
import { liveSession, type LiveSession } from '@/lib/auth/session';
import { env } from '@/lib/env';
import { Refusal } from '@/lib/work/refusal';
import { unkeepable } from '@/lib/work/unkeepable';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';

/** The session token of this browser, or null. */
export async function sessionToken(): Promise<string | null> {
  const jar = await cookies();
  const request = { cookies: Object.fromEntries(jar.getAll().map(({ name, value }) => [name, value])), headers: {} };
  const token = await getToken({ req: request as unknown as NextRequest, secret: env().NEXTAUTH_SECRET, secureCookie: env().NEXTAUTH_URL.startsWith('https:') });
  return token?.sid ?? null;
}

/** Who is signed in, asked of the data base once a request. */
export const currentSession = cache(async (): Promise<LiveSession | null> => {
  const token = await sessionToken();
  return token ? liveSession(token) : null;
});

/** For pages: the signed-in person, or the sign-in page. */
export async function requireSession(): Promise<LiveSession> {
  return (await currentSession()) ?? redirect('/sign-in');
}

/** For pages: may this person see it? Otherwise the page says so. */
export async function requireActor(act: Act): Promise<Actor> {
  const { actor } = await requireSession();
  return may(actor.role, act) ? actor : forbidden();
}

const signInFirst = () => new Refusal('unauthenticated', 'Sign in first.');

/** For the few handlers that act on the session itself: who is signed in. @throws Refusal 'unauthenticated'. */
export async function requireSignedIn(): Promise<Actor> {
  const session = await currentSession();
  if (!session) throw signInFirst();
  return session.actor;
}

/** The same, for the session's token. @throws Refusal 'unauthenticated'. */
export async function requireToken(): Promise<string> {
  const token = await sessionToken();
  if (!token) throw signInFirst();
  return token;
}

/** For pages: loads one view under an act; what is out of reach is 'not found', what the role may not is 'forbidden'. */
export async function loadPage<T>(act: Act, run: (work: Work) => Promise<T>): Promise<T> {
  const actor = await requireActor(act);
  try {
    return await withWork(actor, act, run);
  } catch (error) {
    // An address with an id that is none, or a character no text can hold, leads nowhere.
    if ((error instanceof Refusal && error.code === 'not-found') || unkeepable(error)) notFound();
    if (error instanceof Refusal && error.code === 'forbidden') forbidden();
    throw error;
  }
}
