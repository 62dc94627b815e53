import type { Metadata } from 'next';
import Link from 'next/link';
import { ConsentSection, signedWords } from '@/components/consent/consent-section';
import { EligibilityChecklist } from '@/components/screening/eligibility-checklist';
import { EnrolForm } from '@/components/screening/enrol-form';
import { IdentityForm } from '@/components/screening/identity-form';
import { LeaveScreeningForm } from '@/components/screening/leave-screening-form';
import { formatDate, formatMoment } from '@/components/ui/format';
import { Columns, FactStrip, MarginPart, PageHead } from '@/components/ui/page';
import { upperFirst } from '@/instruments/words';
import { may } from '@/lib/auth/policy';
import { findSigner } from '@/lib/consent/find-signer';
import { viewScreeningConsent } from '@/lib/consent/view-consent';
import { viewIdentity } from '@/lib/enrolment/view-identity';
import { viewScreening } from '@/lib/enrolment/view-screening';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Screening' };

export default async function ScreeningPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  const { role } = await requireActor('screening.view');
  const screening = await loadPage('screening.view', (work) => viewScreening(work, { id }));
  const leads = may(role, 'consent.start');
  const consent = leads ? await loadPage('consent.view', (work) => viewScreeningConsent(work, { screeningId: id })) : null;
  const signer = leads ? await loadPage('consent.view', findSigner) : null;
  const identity = may(role, 'identity.view') ? await loadPage('identity.view', (work) => viewIdentity(work, { id })) : null;
  const { site, state, eligibility, today, version } = screening;
  const isOpen = state === 'screening';
  const title = `Screening ${site.code}-S${String(screening.number).padStart(4, '0')}`;
  return (
    <>
      <PageHead
        title={title}
        beside={site.name}
        crumbs={[{ label: 'Screening', href: '/screening' }, { label: title }]}
        actions={isOpen && may(role, 'screening.leave') ? <LeaveScreeningForm screeningId={id} version={version} /> : null}
      />
      <FactStrip
        facts={[
          { term: 'Screened', value: formatDate(screening.screenedOn) },
          { term: 'Cohort', value: screening.cohort.name },
          { term: 'Referred by', value: screening.referredBy ?? 'Not said' },
          { term: 'Protocol', value: screening.protocolNumber },
          { term: 'Eligibility', value: eligibility ? 'Confirmed' : 'Open' },
          ...(leads ? [{ term: 'Consent', value: upperFirst(signedWords(consent)) }] : []),
          { term: 'State', value: screening.participantCode ? <Link href={`/participants/${screening.participantCode}`}>Enrolled as {screening.participantCode}</Link> : upperFirst(state) },
        ]}
      />
      <Columns margin={identity ? <MarginPart title="Name and contact"><IdentityForm key={identity.version} screeningId={id} identity={identity} today={today} /></MarginPart> : <MarginPart title="Name and contact"><p className="text-ink-2">Seen by the site only.</p></MarginPart>}>
        {state === 'not enrolled' ? (
          <section>
            <h2>Not enrolled</h2>
            <p className="mt-2">{screening.notEnrolledReason}</p>
            {screening.notEnrolledNote ? <p className="text-ink-2">{screening.notEnrolledNote}</p> : null}
          </section>
        ) : null}
        <section className="mt-8">
          <h2>Eligibility</h2>
          {eligibility ? (
            <p className="mt-2">
              Confirmed by {eligibility.confirmedBy}, {formatMoment(eligibility.confirmedAt, site.timeZone)}.
            </p>
          ) : null}
          <EligibilityChecklist key={version} screeningId={id} version={version} criteria={screening.criteria} mayAnswer={isOpen && !eligibility && may(role, 'screening.answer')} mayConfirm={may(role, 'screening.confirm')} />
        </section>
        {signer && (isOpen || consent) ? (
          <section className="mt-8">
            <h2>Consent</h2>
            <ConsentSection screeningId={id} consent={consent} signer={signer} today={today} />
          </section>
        ) : null}
        {isOpen && may(role, 'participant.enrol') ? (
          <section className="mt-8">
            <h2>Enrolment</h2>
            {eligibility && consent?.state === 'complete' ? (
              <EnrolForm screeningId={id} today={today} />
            ) : (
              <p className="mt-2 text-ink-2">
                {[eligibility ? null : 'eligibility is to be confirmed', consent?.state === 'complete' ? null : 'consent is to be completed by both signatures'].filter(Boolean).join(', and ').replace(/^./, (first) => first.toUpperCase())}. Nothing is recorded before that.
              </p>
            )}
          </section>
        ) : null}
      </Columns>
    </>
  );
}
