'use client';

import { useEffect, useRef, useState } from 'react';
import type { ConsentView } from '@/lib/consent/view-consent';
import { ProblemError, send, type ProblemDetails } from '../api/send';
import { useSend } from '../api/use-send';
import { Button, ButtonLink } from '../ui/button';
import { ErrorSummary } from '../ui/error-summary';
import { AgreementForm, useAgreement, type Agreement } from './agreement-form';
import { ConsentFrame } from './consent-frame';
import { PartsBar } from './parts-bar';

export interface ConsentReaderProps {
  consent: Pick<ConsentView, 'id' | 'formNumber' | 'form' | 'sectionsRead' | 'site'>;
  /** Set at home: the token of the link, which stands for a sign-in. */
  invitationToken?: string;
  /** Set on the clinic's tablet: where the staff go on once it was handed back. */
  staffHref?: string;
}

const numbers = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve'];
const inWords = (count: number): string => numbers[count] ?? String(count);

/** Reading time at 150 words a minute, a slow reader's pace; common practice, no source. */
const minutesOf = (paragraphs: readonly string[]): number => Math.max(1, Math.round(paragraphs.join(' ').split(/\s+/).length / 150));

/** The whole consent: parts in order, forward and back, stop and go on another day; then the agreement and the signature. */
export function ConsentReader({ consent, invitationToken, staffHref }: ConsentReaderProps) {
  const { form, formNumber, site } = consent;
  const [read, setRead] = useState<readonly string[]>(consent.sectionsRead);
  const firstUnread = form.sections.findIndex(({ key }) => !consent.sectionsRead.includes(key));
  const [at, setAt] = useState(firstUnread < 0 ? form.sections.length : firstUnread);
  const [signed, setSigned] = useState(false);
  const heading = useRef<HTMLHeadingElement>(null);
  const first = useRef(true);
  useEffect(() => {
    if (!first.current) {
      heading.current?.focus();
      window.scrollTo(0, 0);
    }
    first.current = false;
  }, [at, signed]);
  const bar = <PartsBar count={form.sections.length} read={form.sections.map(({ key }) => read.includes(key))} current={at < form.sections.length ? at : null} />;
  const frame = { formNumber, site, onBack: at > 0 && !signed ? () => setAt(at - 1) : undefined };
  const section = form.sections[at];

  if (signed) return <Signed {...{ frame, heading, staffHref, siteName: site.name }} />;
  if (!section) return <Agreeing {...{ consent, frame, bar, heading, invitationToken, onSigned: () => setSigned(true) }} />;
  return (
    <Part
      key={section.key}
      {...{ frame, bar, heading, section, invitationToken }}
      consentId={consent.id}
      step={`Part ${at + 1} of ${form.sections.length}, about ${minutesOf(section.paragraphs) === 1 ? 'a minute' : `${inWords(minutesOf(section.paragraphs))} minutes`}`}
      isRead={read.includes(section.key)}
      onBack={frame.onBack}
      onRead={(now) => {
        setRead(now);
        setAt(at + 1);
      }}
    />
  );
}

type Frame = { formNumber: string; site: ConsentReaderProps['consent']['site']; onBack: (() => void) | undefined };
type Heading = React.RefObject<HTMLHeadingElement | null>;

interface PartProps {
  frame: Frame;
  bar: React.ReactNode;
  heading: Heading;
  section: ConsentView['form']['sections'][number];
  consentId: string;
  step: string;
  isRead: boolean;
  invitationToken: string | undefined;
  onBack: (() => void) | undefined;
  onRead: (sectionsRead: readonly string[]) => void;
}

function Part({ frame, bar, heading, section, consentId, step, isRead, invitationToken, onBack, onRead }: PartProps) {
  const [saving, setSaving] = useState(false);
  const [refusal, setRefusal] = useState<ProblemDetails | null>(null);
  const markRead = async () => {
    setSaving(true);
    setRefusal(null);
    try {
      const { sectionsRead } = await send<{ sectionsRead: string[] }>('POST', `/api/consents/${consentId}/parts`, { part: section.key }, invitationToken ? { invitationToken } : {});
      onRead(sectionsRead);
    } catch (error) {
      if (!(error instanceof ProblemError)) throw error;
      setRefusal(error.problem);
      setSaving(false);
    }
  };
  const action = (
    <div className="grid grid-cols-[1fr_2fr] gap-2.5">
      {onBack ? (
        <Button size="phone" onClick={onBack}>
          Back
        </Button>
      ) : (
        <span />
      )}
      <Button kind="primary" size="phone" atWork={saving && 'Saving'} onClick={() => void markRead()}>
        {isRead ? 'Go on' : 'I have read this'}
      </Button>
    </div>
  );
  return (
    <ConsentFrame {...frame} action={action}>
      {bar}
      <p className="mt-2 text-[16px] leading-[22px] text-ink-2">{step}</p>
      <h1 ref={heading} tabIndex={-1} className="mt-2.5">
        {section.title}
      </h1>
      {refusal ? <ErrorSummary problems={[{ sentence: refusal.detail }]} title="Not saved" /> : null}
      <div className="mt-4 grid gap-3 font-serif text-[20px] leading-[29px]">
        {section.paragraphs.map((paragraph) => (
          <p key={paragraph}>{paragraph}</p>
        ))}
      </div>
      {section.newSince ? (
        <section className="mt-5 border-t border-note pt-2.5">
          <h2 className="!font-sans text-[17px] font-semibold !text-note">New since the form before</h2>
          <p>{section.newSince}</p>
        </section>
      ) : null}
    </ConsentFrame>
  );
}

interface AgreeingProps {
  consent: ConsentReaderProps['consent'];
  frame: Frame;
  bar: React.ReactNode;
  heading: Heading;
  invitationToken: string | undefined;
  onSigned: () => void;
}

function Agreeing({ consent, frame, bar, heading, invitationToken, onSigned }: AgreeingProps) {
  const agreement = useAgreement(consent.form);
  const signing = useSend<unknown, Agreement>('POST', `/api/consents/${consent.id}/sign`, invitationToken ? { invitationToken } : {});
  const sign = () => {
    const made = agreement.finish();
    if (made) signing.mutate(made, { onSuccess: onSigned });
  };
  const action = (
    <Button kind="primary" size="phone" wide atWork={signing.isPending && 'Sending'} onClick={sign}>
      Sign and send
    </Button>
  );
  // The line may have dropped after the signature arrived: the link is then used up, and that is said.
  const refusal = signing.error?.problem ?? null;
  const shown = refusal?.code === 'expired' && invitationToken ? { ...refusal, detail: `${refusal.detail} If you signed a moment ago, your signature has arrived.` } : refusal;
  return (
    <ConsentFrame {...frame} action={action}>
      {bar}
      <p className="mt-2 text-[16px] leading-[22px] text-ink-2">All {inWords(consent.form.sections.length)} parts read</p>
      <h1 ref={heading} tabIndex={-1} className="mt-2.5 mb-4">
        Your agreement
      </h1>
      <AgreementForm agreement={agreement} refusal={shown} />
      <p className="mt-4 text-[15.5px] leading-[22px] text-ink-2">Somebody of {consent.site.name} signs second. Then a copy goes to you by e-mail at once.</p>
    </ConsentFrame>
  );
}

function Signed({ frame, heading, staffHref, siteName }: { frame: Frame; heading: Heading; staffHref: string | undefined; siteName: string }) {
  return (
    <ConsentFrame {...frame}>
      <h1 ref={heading} tabIndex={-1}>
        You have signed
      </h1>
      <p className="mt-3">
        {staffHref ? `Hand the tablet back to ${siteName} now.` : `${siteName} will sign second.`} Then a copy goes to you by e-mail. You can change your mind at any time, without giving a reason, and your care stays the same.
      </p>
      {staffHref ? (
        <p className="mt-8 border-t border-rule pt-4">
          <ButtonLink href={staffHref} size="phone" wide>
            For {siteName}: take the tablet back
          </ButtonLink>
        </p>
      ) : (
        <p className="mt-3 text-ink-2">You can close this page.</p>
      )}
    </ConsentFrame>
  );
}
