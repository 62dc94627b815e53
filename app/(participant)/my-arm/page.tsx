import type { Metadata } from 'next';
import { MyArm } from '@/components/phone/my-arm';
import { viewArm } from '@/lib/training/view-arm';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'My arm' };

export default async function MyArmPage() {
  return <MyArm arm={await loadPage('arm.view', viewArm)} />;
}
