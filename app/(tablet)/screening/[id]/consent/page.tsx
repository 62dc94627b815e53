import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { Providers } from '@/components/api/providers';
import { ConsentReader } from '@/components/consent/consent-reader';
import { HandOver } from '@/components/consent/hand-over';
import { viewScreeningConsent } from '@/lib/consent/view-consent';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Consent' };

/** Outside the staff's shell: while the tablet is with the participant there is nothing else to press. */
export default async function TabletConsentPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  const consent = await loadPage('consent.view', (work) => viewScreeningConsent(work, { screeningId: id }));
  const { atTablet } = await requireActor('consent.view');
  if (consent?.mode !== 'tablet' || consent.state !== 'reading') redirect(atTablet ? '/hand-back' : `/screening/${id}`);
  if (!atTablet) return <HandOver screeningId={id} siteName={consent.site.name} />;
  return (
    <Providers>
      <ConsentReader
        consent={{ id: consent.id, formNumber: consent.formNumber, form: consent.form, sectionsRead: consent.sectionsRead, site: consent.site }}
        staffHref="/hand-back"
      />
    </Providers>
  );
}
