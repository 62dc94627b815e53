import type { Metadata } from 'next';
import { MyLifting } from '@/components/phone/my-lifting';
import { viewLifting } from '@/lib/training/view-lifting';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'My lifting' };

export default async function MyLiftingPage() {
  return <MyLifting lifting={await loadPage('lifting.view', viewLifting)} />;
}
