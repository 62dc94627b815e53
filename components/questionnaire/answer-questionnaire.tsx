'use client';
import 'survey-core/survey-core.fontless.css';
import './questionnaire.css';
import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useEffect, useState } from 'react';
import { Model, settings } from 'survey-core';
import { Survey } from 'survey-react-ui';
import { LEFT_OUT } from '@/instruments/questionnaires/items';
import type { SurveyJson } from '@/instruments/questionnaires/define-questionnaire';
import type { AnswersSubmitted } from '@/lib/questionnaires/submit-answers';
import type { AlertView, QuestionnaireView } from '@/lib/questionnaires/view-questionnaire';
import { TaskFrame } from '../phone/frame';
import { NotSent } from '../phone/not-sent';
import { Button, ButtonLink } from '../ui/button';
import { Caution } from '../ui/caution';
import { FieldError } from '../ui/field';
import { Gauge } from '../ui/gauge';
import { useKeeping } from './use-keeping';

settings.titleTags.question = 'h1';

type Answers = Record<string, number | string>;

/** The questions as shown: leaving out is a button of its own, so it is no choice among the answers. */
function shown(survey: SurveyJson): object {
  const pages = survey.pages.map((page) => ({
    ...page,
    elements: page.elements.map((element) => (element.type === 'radiogroup' ? { ...element, choices: element.choices.filter(({ value }) => value !== LEFT_OUT) } : element)),
  }));
  return { ...survey, pages, title: undefined, showNavigationButtons: 'none', showTitle: false, questionErrorLocation: 'bottom', focusFirstQuestionAutomatic: false };
}

function openModel({ survey, answers, page }: QuestionnaireView): Model {
  const model = new Model(shown(survey));
  model.data = Object.fromEntries(Object.entries(answers).filter(([, answer]) => answer !== LEFT_OUT));
  model.currentPageNo = Math.min(page, model.visiblePageCount - 1);
  return model;
}

/** One question a screen: answer it or leave it out on purpose; back is allowed until it is sent. */
export function AnswerQuestionnaire({ questionnaire }: { questionnaire: QuestionnaireView }) {
  const router = useRouter();
  const [model] = useState(() => openModel(questionnaire));
  const [leftOut, setLeftOut] = useState<readonly string[]>(() => Object.keys(questionnaire.answers).filter((name) => questionnaire.answers[name] === LEFT_OUT));
  const [, setTurn] = useState(0);
  const [missing, setMissing] = useState<string | undefined>();
  const [sent, setSent] = useState<AnswersSubmitted | null>(null);
  const [sending, setSending] = useState(false);
  const { keep, submit, problem } = useKeeping(questionnaire);
  const redraw = () => setTurn((turn) => turn + 1);

  useEffect(() => {
    const changed = (sender: Model, { name }: { name: string }) => {
      if (sender.getValue(name) !== undefined) setLeftOut((now) => now.filter((left) => left !== name));
      setMissing(undefined);
      redraw();
    };
    model.onValueChanged.add(changed);
    return () => model.onValueChanged.remove(changed);
  }, [model]);

  const item = model.currentPage?.questions[0]?.name ?? '';
  const answersNow = (left: readonly string[]): Answers => ({ ...(model.data as Answers), ...Object.fromEntries(left.map((name) => [name, LEFT_OUT])) });
  const { currentPageNo: page, visiblePageCount: pages } = model;
  const isLast = page === pages - 1;
  const move = (by: 1 | -1, left: readonly string[] = leftOut) => {
    setMissing(undefined);
    if (by === 1) model.nextPage();
    else model.prevPage();
    void keep(answersNow(left), model.currentPageNo);
    redraw();
    window.scrollTo(0, 0);
  };
  const send = async (left: readonly string[] = leftOut) => {
    setSending(true);
    const done = await submit<AnswersSubmitted>(answersNow(left));
    setSending(false);
    if (!done) return;
    setSent(done);
    router.refresh();
  };
  const next = () => {
    if (model.getValue(item) === undefined && !leftOut.includes(item)) {
      setMissing('Choose an answer, or leave the question out.');
      return;
    }
    if (isLast) void send();
    else move(1);
  };
  const leaveOut = () => {
    model.clearValue(item);
    const left = [...leftOut.filter((name) => name !== item), item];
    setLeftOut(left);
    if (model.currentPageNo >= model.visiblePageCount - 1) void send(left);
    else move(1, left);
  };
  const back = { href: '/questions', title: questionnaire.title };
  if (sent) return <Sent sent={sent} back={back} />;
  const alerts = questionnaire.alerts.filter((alert) => alert.item === item && Number(model.getValue(item)) >= alert.atLeast);
  return (
    <TaskFrame
      back={back}
      right={`${page + 1} of ${pages}`}
      hideCaution
      action={
        <div className="phone-two">
          <Button size="phone" onClick={leaveOut}>
            Leave out
          </Button>
          <Button kind="primary" size="phone" atWork={sending && 'Sending'} onClick={next}>
            {isLast ? 'Send my answers' : 'Next'}
          </Button>
        </div>
      }
    >
      <NotSent problem={problem} />
      <div className="mb-4">
        <Gauge bare size={120} state="part" level={page / pages} word={`${page} of ${pages} done`} />
      </div>
      <div className="survey-look">
        <Survey model={model} />
      </div>
      <FieldError id="missing">{missing}</FieldError>
      {leftOut.includes(item) ? <p className="mt-3 text-[16px] text-ink-2">You left this one out. You may still answer it.</p> : null}
      <div aria-live="assertive">
        {alerts.map((alert) => (
          <AlertWords key={alert.item} alert={alert} />
        ))}
      </div>
      <p className="mt-4 text-[16px] leading-6 text-ink-2">
        You may leave a question out.{' '}
        {page > 0 ? (
          <Button kind="link" className="pad-44" onClick={() => move(-1)}>
            Back to the last one
          </Button>
        ) : null}
      </p>
      {page === 0 ? <p className="mt-3 text-[15px] leading-[21px] text-ink-2">{questionnaire.note} Nobody reads answers around the clock.</p> : null}
    </TaskFrame>
  );
}

/** Shown at once with the answer, before anything is sent. */
function AlertWords({ alert: { title, text } }: { alert: AlertView }) {
  return (
    <div className="mt-4">
      <Caution title={`${title}.`}>
        {text}{' '}
        <Link className="font-semibold" href="/report">
          Tell your site now
        </Link>
      </Caution>
    </div>
  );
}

function Sent({ sent, back }: { sent: AnswersSubmitted; back: { href: string; title: string } }) {
  return (
    <TaskFrame
      back={back}
      action={
        <ButtonLink kind="primary" size="phone" wide href="/questions">
          Back to questions
        </ButtonLink>
      }
    >
      <h1>Sent</h1>
      <p className="phone-lede">Your answers are in and closed{sent.isLate ? ', marked as after their day' : ''}. To correct one, ask your site.</p>
      {sent.alerts.map((alert) => (
        <AlertWords key={alert.item} alert={alert} />
      ))}
    </TaskFrame>
  );
}
