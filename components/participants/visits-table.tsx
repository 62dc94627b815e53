import Link from 'next/link';
import type { ParticipantView, ParticipantVisit } from '@/lib/participants/view-participant';
import { countOf, daysBetween, formatDate, formatDateRange, formatMoment, formatSigned } from '../ui/format';
import { Gauge, type GaugeState } from '../ui/gauge';
import { PlainTable } from '../ui/plain-table';

function visitState(visit: ParticipantVisit, today: string): { state: GaugeState; word: string; level?: number } {
  const { state, openQueries, verifiedCount, bookedAt, closesOn, opensOn } = visit;
  if (state === 'missed') return { state: 'empty', word: 'Missed, reason kept' };
  if (openQueries > 0) return { state: 'needs', word: countOf(openQueries, 'open query', 'open queries'), level: 0.8 };
  if (state === 'complete') return verifiedCount > 0 ? { state: 'part', level: 0.9, word: `${countOf(verifiedCount, 'value')} seen at source` } : { state: 'waiting', level: 0.7, word: 'For the monitor' };
  if (state === 'in progress') return { state: 'part', level: 0.5, word: 'In progress' };
  if (closesOn < today) return { state: 'needs', level: 0.05, word: 'Past due' };
  if (bookedAt !== null) return { state: 'empty', word: 'Booked' };
  return { state: 'empty', word: opensOn > today ? 'To come' : 'Not booked' };
}

function againstTarget({ key, deltaDays, bookedAt, state }: ParticipantVisit): string {
  if (deltaDays !== null) return deltaDays === 0 ? 'on target' : `${countOf(Math.abs(deltaDays), 'day')} ${deltaDays > 0 ? 'after' : 'before'}`;
  if (key === 'extra') return 'extra';
  return state === 'to come' && bookedAt === null ? 'not booked' : '';
}

function dateOf({ doneOn, bookedAt, opensOn, closesOn }: ParticipantVisit, timeZone: string): string {
  if (doneOn !== null) return formatDate(doneOn);
  return bookedAt !== null ? formatMoment(new Date(bookedAt), timeZone) : formatDateRange(opensOn, closesOn);
}

function verbOf({ state, bookedAt, closesOn, opensOn }: ParticipantVisit, today: string, mayBook: boolean): string {
  if (state === 'in progress') return 'Continue';
  if (state !== 'to come' || !mayBook) return 'Open';
  if (closesOn < today) return 'Give the reason';
  return bookedAt === null && daysBetween(today, opensOn) < 60 ? 'Book' : 'Open';
}

/** The visits laid out for one participant: when, against the target, what they gave, where they stand. */
export function VisitsTable({ view, mayBook }: { view: ParticipantView; mayBook: boolean }) {
  const { visits, today, code, timeZone } = view;
  return (
    <PlainTable
      caption="Visits"
      rows={visits}
      getRowId={({ id }) => id}
      columns={[
        { id: 'visit', header: 'Visit', cell: ({ name }) => <b>{name}</b> },
        { id: 'date', header: 'Date', cell: (visit) => dateOf(visit, timeZone) },
        { id: 'target', header: 'Against target', cell: (visit) => <span className="text-ink-2">{againstTarget(visit)}</span> },
        {
          id: 'change',
          header: 'Change, %',
          numeric: true,
          cell: ({ rvc, key, leftVolumeMl, state }) => (rvc !== null ? `${formatSigned(rvc * 100)}${state === 'in progress' ? ' *' : ''}` : key === 'baseline' && leftVolumeMl !== null ? formatSigned(0) : ''),
        },
        { id: 'state', header: 'State', cell: (visit) => <Gauge {...visitState(visit, today)} /> },
        {
          id: 'open',
          header: 'Open the visit',
          headerHidden: true,
          cell: (visit) => {
            const verb = verbOf(visit, today, mayBook);
            return (
              <Link className="btn-link" href={`/participants/${code}/visits/${visit.id}`} aria-label={`${verb}: ${visit.name}`}>
                {verb}
              </Link>
            );
          },
        },
      ]}
    />
  );
}
