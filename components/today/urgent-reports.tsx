import { lowerFirst } from '@/instruments/words';
import Link from 'next/link';
import type { TodayView } from '@/lib/today/view-today';
import { ButtonLink } from '../ui/button';
import { UrgentRow } from '../ui/caution';
import { dayIn, formatAge, formatCount, formatMoment, formatTime } from '../ui/format';


/** 'at 11:52' today, with the date on another day. */
function clockWords(dueAt: string, now: Date, timeZone: string): string {
  const due = new Date(dueAt);
  return dayIn(due, timeZone) === dayIn(now, timeZone) ? formatTime(due, timeZone) : formatMoment(due, timeZone);
}

/** Reports with red flags, above the list until somebody has read them. */
export function UrgentReports({ view, mayReview }: { view: TodayView; mayReview: boolean }) {
  const now = new Date(view.now);
  const rows = view.urgent.map(({ id, code, said, reportedAt, dueAt, isOverdue, timeZone, holdTraining }) => (
    <UrgentRow
      key={id}
      title={
        <>
          <Link className="code-link mr-2.5" href={`/participants/${code}`}>
            {code}
          </Link>
          <b>reports: {lowerFirst(said)}.</b> Reported {formatTime(new Date(reportedAt), timeZone)}, {formatAge(new Date(reportedAt), now)}.
        </>
      }
      action={
        <ButtonLink kind="primary" href={`/safety/${id}`}>
          {mayReview ? 'Review the report' : 'Open the report'}
        </ButtonLink>
      }
    >
      The phone has already shown what to do at once. {holdTraining ? 'Training is held. ' : ''}
      {isOverdue ? `The review was due by ${clockWords(dueAt, now, timeZone)}: call now.` : `Call, then record what was done, by ${clockWords(dueAt, now, timeZone)}.`}
    </UrgentRow>
  ));
  if (view.urgentCount <= rows.length) return rows;
  return (
    <>
      {rows}
      <p className="t-small mt-2">
        <b className="is-needs">First {formatCount(rows.length)} of {formatCount(view.urgentCount)} urgent reports.</b> <Link href="/safety">See all of them in Safety</Link>
      </p>
    </>
  );
}
