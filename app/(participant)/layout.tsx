import '@/components/phone/phone.css';
import type { ReactNode } from 'react';
import { redirect } from 'next/navigation';
import { AccountMenu } from '@/components/account/account-menu';
import { ClearUnsent } from '@/components/account/clear-unsent';
import { Providers } from '@/components/api/providers';
import { ParticipantFrame } from '@/components/phone/frame';
import { viewOwnShell } from '@/lib/training/view-own-shell';
import { loadPage, requireSession } from '@/lib/web/session';

/** Every participant page: who it is, how much of two years is gone, what waits. */
export default async function ParticipantLayout({ children }: { children: ReactNode }) {
  const session = await requireSession();
  const { participantId } = session.actor;
  if (session.actor.role !== 'participant' || participantId === null) redirect('/');
  const { code, site, gone, questionsDue } = await loadPage('week.view', viewOwnShell);
  const footer = (
    <>
      <p>
        Questions? Call {site.name} on <a className="pad-44 font-semibold" href={`tel:${site.phone.replace(/[^\d+]/g, '')}`}>{site.phone}</a>. All times are {site.name} local time.
      </p>
      <div className="mt-2">
        <AccountMenu current={session.grantId} grants={[]} />
      </div>
    </>
  );
  return (
    <Providers>
      <ClearUnsent owner={participantId} />
      <ParticipantFrame study={session.studyName} code={code} participantId={participantId} gone={gone} questionsDue={questionsDue} footer={footer}>
        {children}
      </ParticipantFrame>
    </Providers>
  );
}
