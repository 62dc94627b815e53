'use client';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { TrainingFlag } from '@/instruments/training/judge-sessions';
import type { ArmChecked } from '@/lib/safety/check-arm';
import type { SentReport } from '@/lib/safety/keep-report';
import type { SessionLogged } from '@/lib/safety/log-session';
import type { LogView } from '@/lib/training/view-log';
import { Button, ButtonLink } from '../../ui/button';
import { formatNearDate } from '../../ui/format';
import { TaskFrame, useParticipantId } from '../frame';
import { NotSent } from '../not-sent';
import { SentReportWords } from '../sent-report';
import { TakenUp } from '../unsent-line';
import { useKeepOpen, useSending } from '../use-sending';
import { useKeepUnsent, useLeftUnsent, type Left } from '../use-unsent';
import { AdviceSheet } from './advice-sheet';
import { ArmStep } from './arm-step';
import { CheckStep } from './check-step';
import { DoneStep } from './done-step';
import { type Draft, type DraftSet, inUnit, propose, startDraft, toInput } from './draft';
import { FeltStep } from './felt-step';
import { LoadStep } from './load-step';
import { armChanged, armState, flagFor } from './log-rules';

type OpenStep = { at: 'arm' } | { at: 'load'; index: number } | { at: 'felt'; index: number } | { at: 'check' };
type Step = OpenStep | { at: 'held'; report: SentReport } | { at: 'done'; logged: SessionLogged };

/** What is kept on the phone of a session that is not sent. */
interface KeptLog {
  readonly draft: Draft;
  readonly step: OpenStep;
  /** What was being sent when the page went. */
  readonly pressed: 'arm' | 'session' | null;
}

/** From the arm check to the saved session, one thing a screen. One key, so one session whatever the line does. */
export function LogSession({ view }: { view: LogView }) {
  const owner = useParticipantId();
  const { form, ...left } = useLeftUnsent<KeptLog>(owner, 'session');
  return <LogSteps key={form} view={view} owner={owner} left={left} />;
}

function LogSteps({ view, owner, left: { found, isRead, forget } }: { view: LogView; owner: string; left: Omit<Left<KeptLog>, 'form'> }) {
  const router = useRouter();
  const [clientKey] = useState(() => found?.key ?? crypto.randomUUID());
  const [draft, setDraft] = useState<Draft>(() => found?.value.draft ?? startDraft(view));
  const [step, setStep] = useState<Step>(found?.value.step ?? { at: 'arm' });
  const [isTakenUp, setTakenUp] = useState(found !== null);
  /** What was typed last could not be kept: the first press after it stops, so that the sentence is read. */
  const [isFaulty, setFaulty] = useState(false);
  // The number it has when it is begun: once it is saved, the next would already be counted.
  const [title] = useState(`Session ${view.sessionNumber}`);
  const [errors, setErrors] = useState<{ arm?: string; effort?: string; soreness?: string; sets?: string }>({});
  const [flag, setFlag] = useState<TrainingFlag | null>(null);
  const go = (next: Step) => {
    setErrors({});
    setTakenUp(false);
    setStep(next);
    window.scrollTo(0, 0);
  };
  const armSending = useSending<ArmChecked>('/api/arm/check', `${clientKey}-arm`, ({ report }) => go(report ? { at: 'held', report } : { at: 'load', index: 0 }), found?.value.pressed === 'arm' ? { clientKey, armCheck: draft.armCheck } : null);
  const logged = (saved: SessionLogged) => {
    go({ at: 'done', logged: saved });
    router.refresh();
  };
  const sending = useSending<SessionLogged>('/api/training', clientKey, logged, found?.value.pressed === 'session' ? toInput(draft, clientKey) : null);
  const pressed = armSending.isWaiting || armSending.atWork ? 'arm' : sending.isWaiting || sending.atWork ? 'session' : null;
  const isTyped = pressed !== null || step.at === 'felt' || draft.sets.some(({ state, isTouched }) => state !== 'open' || isTouched);
  const value: KeptLog | null = step.at !== 'held' && step.at !== 'done' && isTyped ? { draft, step, pressed } : null;
  const isKept = useKeepUnsent({ owner, kind: 'session', key: clientKey, value, isRead });
  useKeepOpen(value !== null && !isKept);

  const setOf = (index: number): DraftSet | undefined => draft.sets[index];
  const change = (index: number, part: Partial<DraftSet>) => setDraft((now) => propose(view, { ...now, sets: now.sets.map((set, i) => (i === index ? { ...set, ...part } : set)) }));
  const arm = armState(view, draft.on, draft.armCheck);
  const asksSoreness = (index: number) => draft.sets.findIndex(({ state }, i) => state !== 'left out' || i === index) === index;

  const afterArm = () => {
    if (draft.armCheck === null) return setErrors({ arm: 'Answer this first: which comes nearest?' });
    setDraft((now) => propose(view, now));
    if (armChanged(draft.armCheck)) void armSending.start({ clientKey, armCheck: draft.armCheck });
    else go({ at: 'load', index: 0 });
  };
  const afterLoad = (index: number, set: DraftSet) => {
    if (isFaulty) return setFaulty(false);
    const found = set.alreadyLifted ? null : flagFor(view, set, draft.on, draft.armCheck);
    if (found) return setFlag(found);
    go({ at: 'felt', index });
  };
  const onward = (index: number) => go(index + 1 < draft.sets.length ? { at: 'load', index: index + 1 } : { at: 'check' });
  const afterFelt = (index: number, set: DraftSet) => {
    const missing = { ...(set.effort === null ? { effort: 'Choose what comes nearest.' } : {}), ...(asksSoreness(index) && draft.soreness === null ? { soreness: 'Say whether you are sore.' } : {}) };
    if (Object.keys(missing).length > 0) return setErrors(missing);
    change(index, { state: 'done' });
    onward(index);
  };
  const leaveOut = (index: number) => {
    change(index, { state: 'left out' });
    onward(index);
  };
  const save = () => {
    if (!draft.sets.some(({ state }) => state === 'done')) return setErrors({ sets: 'Nothing is logged yet. Change an exercise that you did.' });
    if (draft.soreness === null) return setErrors({ soreness: 'Say whether you are sore: change the first exercise.' });
    void sending.start(toInput(draft, clientKey));
  };
  const answerArm = (armCheck: NonNullable<Draft['armCheck']>) => {
    setErrors({});
    setDraft({ ...draft, armCheck });
  };
  const back = (of: string) => ({ href: '/week', title: of });
  const day = formatNearDate(draft.on);
  const takenUp = isTakenUp ? <TakenUp onForget={forget} /> : null;

  if (step.at === 'arm')
    return (
      <TaskFrame
        back={back('Arm check')}
        right={day}
        action={
          <Button kind="primary" size="phone" wide atWork={armSending.atWork && 'Sending'} onClick={afterArm}>
            {armChanged(draft.armCheck) ? 'Send and go on' : 'Go on'}
          </Button>
        }
      >
        {takenUp}
        <NotSent problem={armSending.problem} isKept={isKept} />
        {view.trainingHeld ? <HoldWords view={view} /> : null}
        {view.baselineOn === null ? <NotYetMeasured view={view} /> : null}
        <ArmStep view={view} armCheck={draft.armCheck} onArmCheck={answerArm} on={draft.on} onDay={(on) => setDraft({ ...draft, on: on || view.today })} error={errors.arm} />
        {armSending.isWaiting ? (
          <Button kind="link" className="pad-44 mt-3" onClick={() => go({ at: 'load', index: 0 })}>
            Go on without the line; it is sent with the session
          </Button>
        ) : null}
      </TaskFrame>
    );
  if (step.at === 'held')
    return (
      <TaskFrame
        back={back('Arm check')}
        right={day}
        action={
          <>
            <ButtonLink kind="primary" size="phone" wide href="/week">
              Back to this week
            </ButtonLink>
            <Button size="phone" wide onClick={() => go({ at: 'load', index: 0 })}>
              Log what I have already lifted
            </Button>
          </>
        }
      >
        <h1>Sent</h1>
        <SentReportWords report={step.report} />
      </TaskFrame>
    );
  if (step.at === 'done')
    return (
      <TaskFrame
        back={back(title)}
        right={day}
        action={
          <ButtonLink kind="primary" size="phone" wide href="/week">
            Back to this week
          </ButtonLink>
        }
      >
        <DoneStep view={view} logged={step.logged} />
      </TaskFrame>
    );
  if (step.at === 'check')
    return (
      <TaskFrame
        back={back(title)}
        right={day}
        action={
          <Button kind="primary" size="phone" wide atWork={sending.atWork && 'Saving'} onClick={save}>
            Save {title.toLowerCase()}
          </Button>
        }
      >
        {takenUp}
        <NotSent problem={sending.problem} isKept={isKept} />
        {errors.sets ?? errors.soreness ? <NotSent problem={{ title: 'Not saved', status: 422, code: 'invalid', detail: errors.sets ?? errors.soreness ?? '' }} /> : null}
        <CheckStep
          view={view}
          draft={draft}
          onEdit={(index) => {
            change(index, { state: 'open' });
            go({ at: 'load', index });
          }}
          onNote={(note) => setDraft({ ...draft, note })}
          onPounds={() => setDraft({ ...draft, sets: draft.sets.map((set) => (set.state === 'done' && set.unit === 'kg' ? { ...set, unit: 'lb' } : set)) })}
        />
      </TaskFrame>
    );
  const { index } = step;
  const set = setOf(index);
  if (!set) return null;
  const following = setOf(index + 1);
  return (
    <TaskFrame
      back={back(title)}
      right={day}
      hideCaution
      action={
        <Button kind="primary" size="phone" wide onClick={() => (step.at === 'load' ? afterLoad(index, set) : afterFelt(index, set))}>
          {step.at === 'load' ? 'Next: how it felt' : following ? `Next: ${following.name.toLowerCase()}` : 'Next: look it over'}
        </Button>
      }
    >
      {takenUp}
      {step.at === 'load' ? (
        <LoadStep key={index} {...{ view, set, index, count: draft.sets.length, on: draft.on, arm }} onChange={(part) => change(index, part)} onLeaveOut={() => leaveOut(index)} onFault={setFaulty} />
      ) : (
        <FeltStep
          key={index}
          {...{ set, index, count: draft.sets.length, soreness: draft.soreness, errors }}
          asksSoreness={asksSoreness(index)}
          onEffort={(effort) => change(index, { effort })}
          onSoreness={(soreness) => setDraft({ ...draft, soreness })}
        />
      )}
      <AdviceSheet
        view={view}
        flag={flag}
        onClose={() => setFlag(null)}
        onChangeTo={(kg) => {
          change(index, { typed: inUnit(kg, set.unit), isTouched: true });
          setFlag(null);
        }}
        onKeep={() => {
          change(index, { alreadyLifted: true, isTouched: true });
          setFlag(null);
          go({ at: 'felt', index });
        }}
      />
    </TaskFrame>
  );
}

function NotYetMeasured({ view }: { view: LogView }) {
  return (
    <div className="phone-say !mt-0 mb-5" role="note">
      <p>
        <b>Your arms have not been measured yet.</b> In the study, training begins after {view.site.name} has measured both. If you have already trained, log it all the same.
      </p>
    </div>
  );
}

function HoldWords({ view }: { view: LogView }) {
  return (
    <div className="phone-say !mt-0 mb-5" role="note">
      <p>
        <b>Please hold your training until {view.site.name} has seen your arm.</b> If you have already trained, log it all the same: the record should be true.
      </p>
    </div>
  );
}
