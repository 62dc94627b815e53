import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { HandBack } from '@/components/consent/hand-back';
import { requireSession } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Give the tablet back' };

export default async function HandBackPage() {
  const { actor } = await requireSession();
  if (!actor.atTablet || !actor.screeningId) redirect('/');
  return <HandBack screeningId={actor.screeningId} />;
}
