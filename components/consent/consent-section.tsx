import type { Signer } from '@/lib/consent/find-signer';
import type { ConsentView } from '@/lib/consent/view-consent';
import { ButtonLink } from '../ui/button';
import { formatMoment } from '../ui/format';
import { Agreed } from './agreed';
import { ChooseWay } from './choose-way';
import { CountersignForm } from './countersign-form';
import { PaperForm } from './paper-form';
import { SendAgain } from './send-again';

export interface ConsentSectionProps {
  screeningId: string;
  consent: ConsentView | null;
  /** Whose name the second signature carries. */
  signer: Signer;
  today: string;
}

/** Consent as the staff lead it: begin, follow, sign second, keep the copy. */
export function ConsentSection({ screeningId, consent, signer, today }: ConsentSectionProps) {
  if (!consent) return <ChooseWay screeningId={screeningId} current={null} />;
  if (consent.state === 'reading')
    return (
      <>
        <Reading {...{ screeningId, consent, today }} />
        <h3 className="mt-8">Another way</h3>
        <ChooseWay screeningId={screeningId} current={consent.mode} />
      </>
    );
  return (
    <>
      <Agreed consent={consent} />
      {consent.state === 'signed by participant' ? (
        <>
          <h3 className="mt-6">Second signature</h3>
          <CountersignForm consentId={consent.id} version={consent.version} signer={signer} />
        </>
      ) : (
        <p className="mt-4 flex flex-wrap gap-3">
          {consent.hasCopy ? <Save href={`/api/consents/${consent.id}/file/copy`} label="Save the participant’s copy" /> : <span className="text-ink-2">The copy is being made.</span>}
          {consent.hasPaperForm ? <Save href={`/api/consents/${consent.id}/file/form`} label="Save the signed form" /> : null}
        </p>
      )}
    </>
  );
}

/** A download is an anchor of its own: the router must not take it for a page. */
function Save({ href, label }: { href: string; label: string }) {
  return (
    <a className="btn" href={href} download>
      <span>{label}</span>
    </a>
  );
}

function Reading({ screeningId, consent, today }: { screeningId: string; consent: ConsentView; today: string }) {
  const { form, sectionsRead, mode, formNumber } = consent;
  const progress = `Form ${formNumber}: ${sectionsRead.length} of ${form.sections.length} parts read.`;
  if (mode === 'paper') return <PaperForm consentId={consent.id} version={consent.version} form={form} hasForm={consent.hasPaperForm} today={today} />;
  if (mode === 'tablet')
    return (
      <div className="mt-3 grid gap-3">
        <p>{progress} The tablet shows nothing else while it is with the participant.</p>
        <div>
          <ButtonLink kind="primary" href={`/screening/${screeningId}/consent`}>
            Hand over the tablet
          </ButtonLink>
        </div>
      </div>
    );
  return (
    <div className="mt-3 grid gap-3">
      <p>{progress} The link was mailed; it works for 14 days and once.</p>
      <div>
        <SendAgain path={`/api/consents/${consent.id}/link`} verb="Send the link again" text="The link before it no longer works." />
      </div>
    </div>
  );
}

/** When both signed, for the head of a page. */
export const signedWords = (consent: ConsentView | null): string =>
  consent?.staffSignedAt ? `complete ${formatMoment(consent.staffSignedAt, consent.site.timeZone)}` : (consent?.state ?? 'not begun');
