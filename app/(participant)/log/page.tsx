import type { Metadata } from 'next';
import { LogSession } from '@/components/phone/log/log-session';
import { viewLog } from '@/lib/training/view-log';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Log a session' };

export default async function LogPage() {
  return <LogSession view={await loadPage('lifting.view', viewLog)} />;
}
