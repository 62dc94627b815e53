import type { ReactNode } from 'react';
import { redirect } from 'next/navigation';
import { AccountMenu } from '@/components/account/account-menu';
import { ClearUnsent } from '@/components/account/clear-unsent';
import { Providers } from '@/components/api/providers';
import { StaffShell } from '@/components/shell/staff-shell';
import { formatCount, formatNearDate, formatTime } from '@/components/ui/format';
import { may, type Act } from '@/lib/auth/policy';
import { roleNames } from '@/lib/auth/roles';
import { viewShell, type ShellView } from '@/lib/today/view-shell';
import { loadPage, requireSession } from '@/lib/web/session';

/** The words of the masthead, with the act that each needs. */
const words: readonly { href: string; label: string; act: Act; count?: (shell: ShellView) => number }[] = [
  { href: '/today', label: 'Today', act: 'today.view' },
  { href: '/participants', label: 'Participants', act: 'participant.list' },
  { href: '/queries', label: 'Queries', act: 'query.list', count: ({ queriesWaiting }) => queriesWaiting },
  { href: '/safety', label: 'Safety', act: 'symptom.list', count: ({ reportsWaiting }) => reportsWaiting },
  { href: '/results', label: 'Results', act: 'results.view' },
  { href: '/extracts', label: 'Extracts', act: 'extract.list' },
  { href: '/audit', label: 'Audit trail', act: 'audit.list' },
  { href: '/protocol', label: 'Protocol', act: 'protocol.view' },
  { href: '/people', label: 'People', act: 'people.list' },
];

/** Every staff page: who acts, where, what waits. */
export default async function StaffLayout({ children }: { children: ReactNode }) {
  const session = await requireSession();
  const { actor, siteNames, studyName, grants } = session;
  if (actor.role === 'participant') redirect('/week');
  if (actor.atTablet) redirect('/');
  const shell = await loadPage('shell.view', viewShell);
  const nav = words.filter(({ act }) => may(actor.role, act)).map(({ href, label, count }) => ({ href, label, count: count?.(shell) ?? 0 }));
  const footer = [
    ...(shell.protocolNumber ? [`Protocol ${shell.protocolNumber}`] : []),
    ...(shell.seal
      ? [`Sealed to entry ${formatCount(Number(shell.seal.lastEntryId))}, ${formatNearDate(shell.seal.sealedAt, shell.timeZone)} ${formatTime(shell.seal.sealedAt, shell.timeZone)}`]
      : []),
    shell.timeZone === 'UTC' ? 'Times are UTC' : `All times are ${siteNames[0] ?? 'site'} local time`,
  ];
  return (
    <Providers>
      <ClearUnsent owner={null} />
      <StaffShell
        homeHref="/"
        study={studyName}
        site={siteNames.length === 1 ? siteNames[0] : 'All sites'}
        nav={nav}
        {...(may(actor.role, 'participant.list') ? { findHref: '/participants' } : {})}
        role={roleNames[actor.role]}
        code={actor.label}
        account={<AccountMenu current={session.grantId} grants={grants.map(({ id, role, label, siteNames: names, wholeStudy }) => ({ id, name: roleNames[role], label, where: wholeStudy ? 'all sites' : names.join(', ') }))} />}
        studyMonth={shell.month}
        footer={footer}
      >
        {children}
      </StaffShell>
    </Providers>
  );
}
