import type { Metadata } from 'next';
import { OpenScreeningForm } from '@/components/screening/open-screening-form';
import { PageHead } from '@/components/ui/page';
import { viewOpening } from '@/lib/enrolment/view-opening';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Open a screening' };

export default async function OpenScreeningPage() {
  await requireActor('screening.open');
  const { cohorts, sites, today } = await loadPage('screening.list', viewOpening);
  return (
    <>
      <PageHead title="Open a screening" crumbs={[{ label: 'Screening', href: '/screening' }, { label: 'Open' }]} lede="Name and contact stay at your site. Everybody else sees the screening number alone." />
      <OpenScreeningForm cohorts={cohorts} sites={sites} today={today} />
    </>
  );
}
