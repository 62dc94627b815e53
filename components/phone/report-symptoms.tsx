'use client';
import Link from 'next/link';
import { useState } from 'react';
import { judgeSymptomReport, NOT_WATCHED, type SafetyVerdict } from '@/instruments/safety/judge-symptom-report';
import { type ReportedSign, reportedSigns } from '@/instruments/safety/symptom-report';
import type { SentReport } from '@/lib/safety/keep-report';
import { Button, ButtonLink } from '../ui/button';
import { Caution } from '../ui/caution';
import { Checkbox } from '../ui/checkbox';
import { DateField } from '../ui/date-field';
import { RadioGroup } from '../ui/radio-group';
import { Stepper } from '../ui/stepper';
import { TextArea } from '../ui/text-area';
import { TaskFrame, useParticipantId } from './frame';
import { NotSent } from './not-sent';
import { SentReportWords } from './sent-report';
import { TakenUp } from './unsent-line';
import { useKeepOpen, useSending } from './use-sending';
import { useKeepUnsent, useLeftUnsent, type Left } from './use-unsent';

export interface ReportSymptomsProps {
  today: string;
  site: { readonly name: string; readonly phone: string };
}

interface Said {
  readonly signs: readonly ReportedSign[];
  readonly lasted: 'yes' | 'no' | null;
  readonly sore: 'no' | 'trained' | 'other' | null;
  readonly soreDays: number;
  readonly noticedOn: string;
  readonly note: string;
}

const urgentGroups: readonly string[] = ['breath', 'very ill', 'clot', 'infection'];
const urgentSigns = reportedSigns.filter(({ group }) => urgentGroups.includes(group));
const otherSigns = reportedSigns.filter(({ group }) => !urgentGroups.includes(group));

const answersOf = ({ signs, lasted, sore, soreDays }: Said) => ({
  signs: [...signs],
  lastedOverADay: lasted === null ? null : lasted === 'yes',
  soreness: sore === null || sore === 'no' ? null : { days: soreDays, onlyTrainedMuscles: sore === 'trained' },
});

const toInput = (said: Said, clientKey: string) => ({ clientKey, noticedOn: said.noticedOn, ...answersOf(said), note: said.note.trim() || null });

/** What is kept on the phone of a report that is not sent. */
interface KeptReport {
  readonly said: Said;
  readonly step: 'urgent' | 'more';
  /** It was being sent when the page went. */
  readonly isPressed: boolean;
}

/** A change in the arm, at any hour: what must not wait first, its advice at once and before anything is sent. */
export function ReportSymptoms(props: ReportSymptomsProps) {
  const owner = useParticipantId();
  const { form, ...left } = useLeftUnsent<KeptReport>(owner, 'report');
  return <ReportSteps key={form} {...props} owner={owner} left={left} />;
}

function ReportSteps({ today, site, owner, left: { found, isRead, forget } }: ReportSymptomsProps & { owner: string; left: Omit<Left<KeptReport>, 'form'> }) {
  const [clientKey] = useState(() => found?.key ?? crypto.randomUUID());
  const [said, setSaid] = useState<Said>(found?.value.said ?? { signs: [], lasted: null, sore: null, soreDays: 1, noticedOn: today, note: '' });
  const [step, setStep] = useState<'urgent' | 'more' | 'sent'>(found?.value.step ?? 'urgent');
  const [sent, setSent] = useState<SentReport | null>(null);
  const [missing, setMissing] = useState<string | null>(null);
  const arrived = (report: SentReport) => {
    setSent(report);
    setStep('sent');
    window.scrollTo(0, 0);
  };
  const sending = useSending<SentReport>('/api/symptoms', clientKey, arrived, found?.value.isPressed ? toInput(said, clientKey) : null);
  const verdict = judgeSymptomReport(answersOf(said));
  const isUrgent = verdict !== null && (verdict.urgency === 'emergency now' || verdict.urgency === 'same-day care');
  const isTyped = step !== 'sent' && (said.signs.length > 0 || said.sore !== null || said.note !== '');
  const value: KeptReport | null = isTyped ? { said, step, isPressed: sending.isWaiting || sending.atWork } : null;
  const isKept = useKeepUnsent({ owner, kind: 'report', key: clientKey, value, isRead });
  useKeepOpen(isTyped && !isKept);

  const tick = (code: ReportedSign, on: boolean) => {
    setMissing(null);
    setSaid({ ...said, signs: on ? [...said.signs, code] : said.signs.filter((sign) => sign !== code) });
  };
  const more = () => {
    setStep('more');
    window.scrollTo(0, 0);
  };
  const submit = () => {
    if (verdict === null) return setMissing('Choose at least one thing that you notice, or say that you are sore.');
    setMissing(null);
    void sending.start(toInput(said, clientKey));
  };
  const back = { href: '/week', title: 'Tell us of a change' };
  const takenUp = found ? <TakenUp onForget={forget} /> : null;

  if (step === 'sent' && sent)
    return (
      <TaskFrame
        back={back}
        hideCaution={isUrgent}
        action={
          <ButtonLink kind="primary" size="phone" wide href="/week">
            Back to this week
          </ButtonLink>
        }
      >
        <h1>Sent</h1>
        <SentReportWords report={sent} />
      </TaskFrame>
    );
  const sendButton = (
    <Button kind="primary" size="phone" wide atWork={sending.atWork && 'Sending'} onClick={submit}>
      Send to {site.name}
    </Button>
  );
  if (step === 'urgent')
    return (
      <TaskFrame
        back={back}
        right="1 of 2"
        hideCaution
        action={
          said.signs.length > 0 ? (
            <>
              {/* Beside the thumb: at the head of the list it would be off the screen of whoever ticks the last sign. */}
              <div aria-live="assertive">{verdict && isUrgent ? <UrgentWords verdict={verdict} site={site} /> : null}</div>
              {sendButton}
              <Button size="phone" wide onClick={more}>
                Say more first
              </Button>
            </>
          ) : undefined
        }
      >
        {takenUp}
        <NotSent problem={sending.problem} isKept={isKept} />
        <h1>First: is any of this so?</h1>
        <p className="phone-lede">{NOT_WATCHED} Call your local emergency number.</p>
        <Signs signs={urgentSigns} chosen={said.signs} onTick={tick} label="Signs that must not wait" />
        {said.signs.length === 0 ? (
          <Button className="mt-6" kind="primary" size="phone" wide onClick={more}>
            None of these: go on
          </Button>
        ) : null}
      </TaskFrame>
    );
  return (
    <TaskFrame back={back} right="2 of 2" action={sendButton}>
      {takenUp}
      <NotSent problem={sending.problem} isKept={isKept} />
      {missing ? <NotSent problem={{ title: 'Not sent', status: 422, code: 'invalid', detail: missing }} /> : null}
      <h1>What do you notice?</h1>
      <div className="mt-4" aria-live="polite">{verdict && isUrgent ? <UrgentWords verdict={verdict} site={site} /> : null}</div>
      <Signs signs={otherSigns} chosen={said.signs} onTick={tick} label="What you notice in your arm" />
      <div className="mt-7 grid gap-6">
        <RadioGroup
          name="lasted"
          as="row"
          label="Is it still there after a day?"
          hint="A day is 24 hours from when you first noticed it."
          choices={[
            { value: 'yes', label: 'Yes' },
            { value: 'no', label: 'No' },
          ]}
          value={said.lasted}
          onChange={(event) => setSaid({ ...said, lasted: event.target.value as 'yes' | 'no' })}
        />
        <RadioGroup
          name="sore"
          as="tiles"
          label="Are your muscles sore?"
          choices={[
            { value: 'no', label: 'No' },
            { value: 'trained', label: 'Yes, only those I trained' },
            { value: 'other', label: 'Yes, and elsewhere in the arm' },
          ]}
          value={said.sore}
          onChange={(event) => {
            setMissing(null);
            setSaid({ ...said, sore: event.target.value as NonNullable<Said['sore']> });
          }}
        />
        {said.sore === 'trained' || said.sore === 'other' ? (
          <Stepper size="small" label="Days sore" value={said.soreDays} min={1} max={60} onChange={(soreDays) => setSaid({ ...said, soreDays })} />
        ) : null}
        <DateField label="When did you notice it?" value={said.noticedOn} max={today} onChange={(event) => setSaid({ ...said, noticedOn: event.target.value || today })} />
        <TextArea label="Anything else" optional maxLength={1000} value={said.note} onChange={(event) => setSaid({ ...said, note: event.target.value })} />
      </div>
      <div aria-live="polite">{verdict && !isUrgent ? <Foretold verdict={verdict} /> : null}</div>
      <p className="mt-4 text-[16px] leading-6 text-ink-2">{NOT_WATCHED}</p>
    </TaskFrame>
  );
}

function Signs({ signs, chosen, onTick, label }: { signs: typeof urgentSigns | typeof otherSigns; chosen: readonly ReportedSign[]; onTick: (code: ReportedSign, on: boolean) => void; label: string }) {
  return (
    <fieldset className="mt-5 grid gap-2.5">
      <legend className="sr-only">{label}</legend>
      {signs.map(({ code, text }) => (
        <Checkbox key={code} tile label={text} checked={chosen.includes(code)} onChange={(event) => onTick(code, event.target.checked)} />
      ))}
    </fieldset>
  );
}

/** The level's own words, shown on the device itself: no line is needed to read them. */
function UrgentWords({ verdict, site }: { verdict: SafetyVerdict; site: ReportSymptomsProps['site'] }) {
  return (
    <div className="text-[16px] leading-[23px]">
      <Caution title={`${verdict.participantTitle}.`}>
        {verdict.participantText} The site is on <a className="font-semibold" href={`tel:${site.phone.replace(/[^\d+]/g, '')}`}>{site.phone}</a>.
      </Caution>
    </div>
  );
}

function Foretold({ verdict }: { verdict: SafetyVerdict }) {
  return (
    <div className="phone-say">
      <p>
        <b>{verdict.participantTitle}.</b> {verdict.participantText} <Link className="font-semibold" href="/week">This week</Link> shows whether your training waits.
      </p>
    </div>
  );
}
