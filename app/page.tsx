import { redirect } from 'next/navigation';
import { may, type Act } from '@/lib/auth/policy';
import { currentSession } from '@/lib/web/session';

/** Where each role's day begins. */
const starts: readonly (readonly [Act, string])[] = [
  ['week.view', '/week'],
  ['today.view', '/today'],
  ['query.raise', '/queries'],
  ['results.view', '/results'],
  ['people.list', '/people'],
  ['audit.list', '/audit'],
];

export default async function HomePage() {
  const session = await currentSession();
  if (!session) redirect('/welcome');
  if (session.actor.atTablet && session.actor.screeningId) redirect(`/screening/${session.actor.screeningId}/consent`);
  redirect(starts.find(([act]) => may(session.actor.role, act))?.[1] ?? '/protocol');
}
