import Link from 'next/link';
import type { TodayView } from '@/lib/today/view-today';
import { ButtonLink } from '../ui/button';
import { UrgentRow } from '../ui/caution';
import { dayIn, formatAge, formatMoment, formatTime } from '../ui/format';

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);

/** 'at 11:52' today, with the date on another day. */
function clockWords(dueAt: string, now: Date, timeZone: string): string {
  const due = new Date(dueAt);
  return dayIn(due, timeZone) === dayIn(now, timeZone) ? formatTime(due, timeZone) : formatMoment(due, timeZone);
}

/** Reports with red flags, above the list until somebody has read them. */
export function UrgentReports({ view, mayReview }: { view: TodayView; mayReview: boolean }) {
  const now = new Date(view.now);
  return view.urgent.map(({ id, participantCode, said, reportedAt, dueAt, isOverdue, timeZone, holdTraining }) => (
    <UrgentRow
      key={id}
      title={
        <>
          <Link className="code-link mr-2.5" href={`/participants/${participantCode}`}>
            {participantCode}
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
      {dueAt === null ? 'Call, then record what was done.' : isOverdue ? `The review was due by ${clockWords(dueAt, now, timeZone)}: call now.` : `Call, then record what was done, by ${clockWords(dueAt, now, timeZone)}.`}
    </UrgentRow>
  ));
}
