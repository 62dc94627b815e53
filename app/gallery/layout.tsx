import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import type { ReactNode } from 'react';
import { env } from '@/lib/env';

export const metadata: Metadata = { title: 'Component examples' };

/** For those who build and test; in production there is no such page outside the demonstration. */
export default function GalleryLayout({ children }: { children: ReactNode }) {
  if (env().PRODUCTION && !env().DEMO) notFound();
  return children;
}
