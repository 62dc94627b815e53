import type { Metadata } from 'next';
import { Week } from '@/components/phone/week';
import { viewWeek } from '@/lib/training/view-week';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'This week' };

export default async function WeekPage() {
  return <Week week={await loadPage('week.view', viewWeek)} />;
}
