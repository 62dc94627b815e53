'use client';

import { useState } from 'react';
import type { QueryMessageView, QueryView } from '@/lib/queries/view-query';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { countOf, dayIn, daysBetween, formatMoment } from '../ui/format';
import { MonitorWords, Note, SiteWords } from '../ui/note';
import { ReasonDialog } from '../ui/reason-dialog';
import { WriteNote } from './write-note';

/** What this person may do in the margin. */
export interface MarginRights {
  readonly mark: boolean;
  readonly raise: boolean;
  readonly answer: boolean;
  readonly close: boolean;
  readonly correct: boolean;
}

export interface QueryNoteProps {
  query: QueryView;
  rights: MarginRights;
  timeZone: string;
  /** Today by the clock of the site. */
  today: string;
  /** Something was saved: the page is to be loaded anew. */
  onDone: (said: string) => void;
  /** Opens the correction of the value, which then answers this query. */
  onCorrect: (() => void) | null;
}

/** 'Q-0431'. */
export const queryNumber = (number: number): string => `Q-${String(number).padStart(4, '0')}`;

/** A query with its thread, and what may be done about it now. */
export function QueryNote(props: QueryNoteProps) {
  const { query, timeZone, today, rights } = props;
  const days = Math.max(0, daysBetween(dayIn(new Date(query.raisedAt), timeZone), today));
  const number = ` ${queryNumber(query.number)}`;
  if (query.state === 'closed' || query.state === 'cancelled') return <EndedNote {...props} />;
  const isOpen = query.state === 'open';
  const who = isOpen ? (rights.answer ? 'with you' : `with ${query.siteName}`) : rights.close ? 'with you' : 'with the monitor';
  return (
    <div id={`query-${query.id}`}>
      <Note
        kind={isOpen ? 'open' : 'answered'}
        state={isOpen ? 'Query' : 'Answered'}
        number={isOpen ? `${number}, open` : `,${number}`}
        aside={`${countOf(days, 'day')}, ${who}`}
        late={isOpen && today > query.dueOn}
        actions={isOpen ? <OpenActions {...props} /> : <AnsweredActions {...props} />}
      >
        <Thread messages={query.messages} origin={query.origin} timeZone={timeZone} />
      </Note>
    </div>
  );
}

function EndedNote({ query, timeZone }: QueryNoteProps) {
  const last = query.messages.at(-1);
  const question = query.messages.find(({ kind }) => kind === 'question');
  const answer = query.messages.findLast(({ kind }) => kind === 'answer');
  return (
    <div id={`query-${query.id}`}>
      <Note kind="closed" state={query.state === 'closed' ? 'Closed' : 'Withdrawn'} number={`, ${queryNumber(query.number)}`}>
        <p className="note-by">
          “{question?.text}”{answer ? ` ${answer.text}` : ''} {last && last !== answer ? last.text : ''}
          <br />
          {last ? byLine(last, timeZone) : null}
        </p>
      </Note>
    </div>
  );
}

const byLine = ({ label, at }: QueryMessageView, timeZone: string): string => `${label}, ${formatMoment(new Date(at), timeZone)}`;

function Thread({ messages, origin, timeZone }: { messages: readonly QueryMessageView[]; origin: QueryView['origin']; timeZone: string }) {
  return (
    <>
      {messages.map((message, index) => {
        const by = byLine(message, timeZone);
        if (message.kind === 'answer')
          return (
            <SiteWords key={index} by={by}>
              {message.text}
            </SiteWords>
          );
        if (message.kind === 'remind')
          return (
            <p key={index} className="note-by">
              Reminded: {by}
            </p>
          );
        return (
          <MonitorWords key={index} by={index === 0 && origin === 'check' ? `Edit check, when ${by} saved` : by}>
            {message.text}
          </MonitorWords>
        );
      })}
    </>
  );
}

function OpenActions({ query, rights, onDone, onCorrect }: QueryNoteProps) {
  const [open, setOpen] = useState<'answer' | 'withdraw' | null>(null);
  const remind = useSend<QueryView>('POST', `/api/queries/${query.id}/remind`, { version: query.version });
  const cancel = useSend<QueryView, { reason: string }>('POST', `/api/queries/${query.id}/cancel`, { version: query.version });
  if (open === 'answer')
    return <WriteNote path={`/api/queries/${query.id}/answer`} field="answer" label="Your answer" verb="Answer" version={query.version} onDone={() => onDone('Answered.')} onDiscard={() => setOpen(null)} />;
  return (
    <>
      {rights.answer ? (
        <Button kind="primary" size="small" onClick={() => setOpen('answer')}>
          Answer
        </Button>
      ) : null}
      {rights.answer && onCorrect ? (
        <Button size="small" onClick={onCorrect}>
          Correct the value
        </Button>
      ) : null}
      {rights.close ? (
        <>
          <Button kind="link" atWork={remind.isPending ? 'Reminding' : false} onClick={() => remind.mutate({}, { onSuccess: () => onDone('Reminded, once a day at most.') })}>
            Remind
          </Button>
          <Button kind="link" onClick={() => setOpen('withdraw')}>
            Withdraw
          </Button>
        </>
      ) : null}
      {remind.error ? <Refused sentence={remind.error.problem.detail} /> : null}
      <ReasonDialog
        open={open === 'withdraw'}
        onClose={() => setOpen(null)}
        title={`Withdraw ${queryNumber(query.number)}?`}
        explains="The site then need not answer. The question and your reason stay in the margin."
        confirmLabel="Withdraw"
        keepLabel="Keep the query"
        reasons={['Asked by mistake', 'Asked elsewhere already']}
        onConfirm={({ reason }) => cancel.mutate({ reason }, { onSuccess: () => onDone('Withdrawn.') })}
        atWork={cancel.isPending ? 'Withdrawing' : false}
        error={cancel.error?.problem.detail}
      />
    </>
  );
}

function AnsweredActions({ query, rights, onDone }: QueryNoteProps) {
  const [asking, setAsking] = useState(false);
  const close = useSend<QueryView>('POST', `/api/queries/${query.id}/close`, { version: query.version });
  if (!rights.close) return null;
  if (asking)
    return <WriteNote path={`/api/queries/${query.id}/ask-again`} field="question" label="What is still open" verb="Ask again" version={query.version} hand onDone={() => onDone('Asked again.')} onDiscard={() => setAsking(false)} />;
  return (
    <>
      <Button kind="primary" size="small" atWork={close.isPending ? 'Closing' : false} onClick={() => close.mutate({}, { onSuccess: () => onDone('Closed.') })}>
        Accept and close
      </Button>
      <Button size="small" onClick={() => setAsking(true)}>
        Ask again
      </Button>
      {close.error ? <Refused sentence={close.error.problem.detail} /> : null}
    </>
  );
}

/** A refusal beside the buttons it answers. */
export function Refused({ sentence }: { sentence: string }) {
  return (
    <p role="alert" className="is-needs basis-full">
      {sentence}
    </p>
  );
}
