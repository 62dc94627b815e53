import type { Metadata } from 'next';
import { LimbPage } from '@/components/measurement/limb-page';
import { FactStrip, PageHead } from '@/components/ui/page';
import { formatDate } from '@/components/ui/format';
import { may } from '@/lib/auth/policy';
import { viewLimbPage } from '@/lib/measurement/view-limb-page';
import { loadPage, requireSession } from '@/lib/web/session';

type Props = { params: Promise<{ code: string; visitId: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: `Tape, ${(await params).code}` };
}

export default async function Page({ params }: Props) {
  const { code, visitId } = await params;
  const page = await loadPage('assessment.view', (work) => viewLimbPage(work, { code, visitId }));
  const { actor } = await requireSession();
  const { visit, affectedSide } = page;
  return (
    <>
      <PageHead
        title="Tape, both arms"
        crumbs={[{ label: code, href: `/participants/${code}` }, { label: visit.name, href: `/participants/${code}/visits/${visit.id}` }, { label: 'Tape' }]}
      />
      <FactStrip
        facts={[
          { term: 'Participant', value: `${code}, ${affectedSide} arm affected` },
          { term: 'Date', value: formatDate(visit.doneOn ?? page.today) },
          { term: 'At', value: page.siteName },
          { term: 'Marks', value: marksInWords(page.map) },
          { term: 'A third reading beyond', value: `${(page.toleranceMm / 10).toFixed(1)} cm between trials` },
        ]}
      />
      <LimbPage page={page} mayMeasure={may(actor.role, 'assessment.begin')} />
    </>
  );
}

const marksInWords = ({ startOffsetMm, stepMm, levelCount }: { startOffsetMm: number; stepMm: number; levelCount: number }): string =>
  `${levelCount}, every ${stepMm / 10} cm from ${startOffsetMm / 10} cm above the wrist`;
