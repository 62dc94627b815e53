import type { ReactNode } from 'react';
import { redirect } from 'next/navigation';
import { Providers } from '@/components/api/providers';
import { requireSession } from '@/lib/web/session';

/** Every participant page. */
export default async function ParticipantLayout({ children }: { children: ReactNode }) {
  const { actor } = await requireSession();
  if (actor.role !== 'participant') redirect('/');
  return (
    <Providers>
      <div className="phone on-phone">
        <main id="main" tabIndex={-1} className="phone-body">
          {children}
        </main>
      </div>
    </Providers>
  );
}
