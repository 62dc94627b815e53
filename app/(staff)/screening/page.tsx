import type { Metadata } from 'next';
import { ScreeningLog } from '@/components/screening/screening-log';
import { ButtonLink } from '@/components/ui/button';
import { Columns, MarginPart, PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { listScreeningsInput } from '@/lib/enrolment/input';
import { listScreenings } from '@/lib/enrolment/list-screenings';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Screening' };

export default async function ScreeningLogPage() {
  const actor = await requireActor('screening.list');
  const first = await loadPage('screening.list', (work) => listScreenings(work, listScreeningsInput.parse({})));
  const { counts } = first;
  return (
    <>
      <PageHead
        title="Screening"
        lede={`${counts.screened} considered, ${counts.enrolled} enrolled, ${counts.notEnrolled} not enrolled, ${counts.open} open.`}
        actions={may(actor.role, 'screening.open') ? <ButtonLink kind="primary" href="/screening/new">Open a screening</ButtonLink> : null}
      />
      <Columns
        marginLabel="Reasons when not enrolled"
        margin={
          <MarginPart title="When not enrolled">
            {counts.reasons.length === 0 ? <p className="text-ink-2">Nobody so far.</p> : null}
            <dl>
              {counts.reasons.map(({ reason, count }) => (
                <div key={reason} className="flex justify-between gap-4 border-b border-rule py-1.5">
                  <dt>{reason}</dt>
                  <dd className="t-num">{count}</dd>
                </div>
              ))}
            </dl>
          </MarginPart>
        }
      >
        <ScreeningLog first={first} />
      </Columns>
    </>
  );
}
