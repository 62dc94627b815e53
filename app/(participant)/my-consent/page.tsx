import type { Metadata } from 'next';
import { Agreed } from '@/components/consent/agreed';
import { viewMyConsent } from '@/lib/consent/view-consent';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'My consent' };

export default async function MyConsentPage() {
  const consent = await loadPage('consent.view', viewMyConsent);
  const { site } = consent;
  return (
    <>
      <h1>My consent</h1>
      <p className="phone-lede">What you agreed to, and what you chose.</p>
      <div className="mt-4">
        <Agreed consent={consent} />
      </div>
      <p className="mt-5">
        {consent.hasCopy ? (
          <a className="btn btn-phone btn-wide" href={`/api/consents/${consent.id}/file/copy`} download>
            <span>Save my copy</span>
          </a>
        ) : (
          'Your copy is being made. It comes by e-mail and will stand here.'
        )}
      </p>
      <section className="mt-8 border-t border-rule pt-4">
        <h2>If you change your mind</h2>
        <p className="mt-2">
          You can stop at any time, without giving a reason, and your care stays the same. You can stop the training only, the visits, or everything. Call {site.name} on{' '}
          <a className="pad-44 font-semibold" href={`tel:${site.phone.replace(/[^\d+]/g, '')}`}>
            {site.phone}
          </a>{' '}
          or write to {site.email}.
        </p>
        <p className="mt-2 text-ink-2">To change one of your choices above, tell {site.name} in the same way.</p>
      </section>
    </>
  );
}
