import type { Metadata } from 'next';
import { Landing } from '@/components/public/landing';
import { systemActor } from '@/lib/auth/roles';
import { viewWelcome } from '@/lib/today/view-welcome';
import { readWork } from '@/lib/work/with-work';

export const metadata: Metadata = { title: { absolute: 'Lifting and arm swelling after breast cancer · Tidemark' } };
export const dynamic = 'force-dynamic';

export default async function WelcomePage() {
  return <Landing view={await readWork(systemActor(), 'welcome.view', viewWelcome)} />;
}
