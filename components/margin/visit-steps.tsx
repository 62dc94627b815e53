'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import type { VisitView } from '@/lib/schedule/view-visit';
import { useSend } from '../api/use-send';
import { Button, ButtonLink } from '../ui/button';
import { DateField } from '../ui/date-field';
import { Dialog } from '../ui/dialog';
import { formatDateRange } from '../ui/format';
import { ReasonDialog } from '../ui/reason-dialog';
import { useToast } from '../ui/toast';

export interface VisitStepsProps {
  visit: VisitView;
  limbHref: string;
  /** An assessment is open. */
  isUnderWay: boolean;
  rights: { readonly measure: boolean; readonly book: boolean; readonly miss: boolean; readonly end: boolean; readonly undo: boolean };
  /** Today by the clock of the site. */
  today: string;
}

/** What can be done with a visit that has not ended: measure, book, mark as missed, end without measuring. */
export function VisitSteps({ visit, limbHref, isUnderWay, rights, today }: VisitStepsProps) {
  const [open, setOpen] = useState<'book' | 'miss' | 'undo' | null>(null);
  const router = useRouter();
  const { say } = useToast();
  const version = { version: visit.version };
  const miss = useSend<VisitView, { missedReason: string }>('POST', `/api/visits/${visit.id}/miss`, version);
  const end = useSend<VisitView>('POST', `/api/visits/${visit.id}/complete`, version);
  const undo = useSend<VisitView, { reason: string }>('POST', `/api/visits/${visit.id}/undo`, version);
  const done = (word: string) => {
    setOpen(null);
    say({ kind: 'fine', word });
    router.refresh();
  };
  if (visit.state !== 'to come' && visit.state !== 'in progress') return null;
  return (
    <div className="visit-steps">
      {rights.measure ? (
        <ButtonLink href={limbHref} kind="primary">
          {isUnderWay ? 'Go on measuring' : 'Measure both arms'}
        </ButtonLink>
      ) : null}
      {visit.state === 'to come' && rights.book ? <Button onClick={() => setOpen('book')}>{visit.bookedAt ? 'Book another time' : 'Book the visit'}</Button> : null}
      {visit.state === 'to come' && rights.miss && visit.closesOn < today ? (
        <Button kind="link" onClick={() => setOpen('miss')}>
          It did not take place
        </Button>
      ) : null}
      {visit.state === 'in progress' && !isUnderWay && rights.end ? (
        <Button kind="link" atWork={end.isPending ? 'Ending' : false} onClick={() => end.mutate({}, { onSuccess: () => done('Visit ended.') })}>
          End it without measuring
        </Button>
      ) : null}
      {visit.state === 'in progress' && rights.undo ? (
        <Button kind="link" onClick={() => setOpen('undo')}>
          It was begun by mistake
        </Button>
      ) : null}
      {end.error ? (
        <p role="alert" className="is-needs basis-full">
          {end.error.problem.detail}
        </p>
      ) : null}
      {open === 'book' ? <BookDialog visit={visit} today={today} onClose={() => setOpen(null)} onDone={() => done('Booked.')} /> : null}
      <ReasonDialog
        open={open === 'undo'}
        onClose={() => setOpen(null)}
        title={`${visit.name} was begun by mistake?`}
        explains="It is to come again, as long as nothing was written down at it. That it was begun stays in the trail, with your reason."
        confirmLabel="Set it back"
        keepLabel="Leave it begun"
        reasons={['Begun at the wrong visit', 'Begun for the wrong participant', 'The participant left before measuring']}
        onConfirm={({ reason }) => undo.mutate({ reason }, { onSuccess: () => done('Set back: the visit is to come.') })}
        atWork={undo.isPending ? 'Setting back' : false}
        error={undo.error?.problem.detail}
      />
      <ReasonDialog
        open={open === 'miss'}
        onClose={() => setOpen(null)}
        title={`${visit.name} did not take place?`}
        explains="The reason feeds the follow-up figures."
        confirmLabel="Mark as missed"
        keepLabel="Keep it open"
        reasons={['Could not be reached', 'Unwell', 'No time in the window', 'Site was closed']}
        onConfirm={({ reason }) => miss.mutate({ missedReason: reason }, { onSuccess: () => done('Marked as missed.') })}
        atWork={miss.isPending ? 'Saving' : false}
        error={miss.error?.problem.detail}
      />
    </div>
  );
}

/** What a day out of the window means for the visit; nothing within it. */
function windowWords({ opensOn, closesOn }: VisitView, on: string): string | undefined {
  if (on === '' || (on >= opensOn && on <= closesOn)) return undefined;
  return `Out of the window ${formatDateRange(opensOn, closesOn)}: the visit will count as ${on < opensOn ? 'early' : 'late'}, and asks for a reason when it begins.`;
}

function BookDialog({ visit, today, onClose, onDone }: { visit: VisitView; today: string; onClose: () => void; onDone: () => void }) {
  const [at, setAt] = useState('');
  const [isEmpty, setIsEmpty] = useState(false);
  const book = useSend<VisitView>('POST', `/api/visits/${visit.id}/book`, { version: visit.version });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const [on, time] = at.split('T');
    if (!on || !time) setIsEmpty(true);
    else if (!book.isPending) book.mutate({ on, time: time.slice(0, 5) }, { onSuccess: onDone });
  };
  return (
    <Dialog
      open
      onClose={onClose}
      title={`When is ${visit.name}?`}
      actions={
        <>
          <Button type="submit" form="book-form" kind="primary" atWork={book.isPending ? 'Booking' : false}>
            Book it
          </Button>
          <Button onClick={onClose}>Not now</Button>
        </>
      }
    >
      <form id="book-form" noValidate onSubmit={submit}>
        <DateField label="Day and time, by the clock of the site" withTime min={`${today}T00:00`} value={at} hint={windowWords(visit, at.slice(0, 10))} error={isEmpty && !at ? 'Give the day and the time.' : book.error?.problem.detail} onChange={(event) => setAt(event.target.value)} />
      </form>
    </Dialog>
  );
}
