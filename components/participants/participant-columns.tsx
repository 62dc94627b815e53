import Link from 'next/link';
import type { ParticipantRow } from '@/lib/participants/list-participants';
import { daysBetween, formatDate, formatDateRange, formatSigned } from '../ui/format';
import { Gauge, type GaugeState } from '../ui/gauge';
import type { TableColumn } from '../ui/plain-table';

/** Where somebody stands, as a word and a level. */
function standing({ state, trainingHeld, visitsDone, visitsOf }: ParticipantRow): { state: GaugeState; word: string; level?: number } {
  if (state === 'withdrawn') return { state: 'closed', word: 'Withdrawn' };
  if (state === 'completed') return { state: 'done', word: 'Completed' };
  const level = visitsOf > 0 ? visitsDone / visitsOf : 0;
  if (trainingHeld) return { state: 'needs', word: 'Training held', level };
  return visitsDone === 0 ? { state: 'empty', word: 'No visit yet' } : { state: 'part', word: `${visitsDone} of ${visitsOf} visits`, level };
}

function NextWindow({ row, today }: { row: ParticipantRow; today: string }) {
  const { nextVisitName, nextOpens, nextCloses } = row;
  if (nextVisitName === null || nextOpens === null || nextCloses === null) return <span className="text-ink-3">none</span>;
  const left = daysBetween(today, nextCloses);
  return (
    <>
      {nextVisitName}
      <span className={`block text-[13.5px] leading-[19px] ${left < 0 ? 'is-needs' : 'text-ink-2'}`}>
        {left < 0 ? `closed ${formatDate(nextCloses)}` : formatDateRange(nextOpens, nextCloses)}
      </span>
    </>
  );
}

/** Columns of the list; ids are the server's names for sorting. */
export const participantColumns = (today: string, manySites: boolean): readonly TableColumn<ParticipantRow>[] => [
  {
    id: 'code',
    header: 'Participant',
    sortable: true,
    cell: ({ code }) => (
      <Link className="code-link" href={`/participants/${code}`}>
        {code}
      </Link>
    ),
  },
  ...(manySites ? [{ id: 'site', header: 'Site', sortable: true, cell: ({ siteName }: ParticipantRow) => siteName }] : []),
  { id: 'cohort', header: 'Cohort', cell: ({ cohort }) => cohort },
  { id: 'enrolledOn', header: 'Enrolled', sortable: true, cell: ({ enrolledOn }) => formatDate(enrolledOn) },
  {
    id: 'lastVisitOn',
    header: 'Last measured',
    sortable: true,
    cell: ({ lastVisitName, lastVisitOn }) =>
      lastVisitOn === null ? (
        <span className="text-ink-3">not yet</span>
      ) : (
        <>
          {lastVisitName}
          <span className="block text-[13.5px] leading-[19px] text-ink-2">{formatDate(lastVisitOn)}</span>
        </>
      ),
  },
  {
    id: 'change',
    header: 'RVC, %',
    numeric: true,
    sortable: true,
    cell: ({ change, verdict }) =>
      change === null ? (
        <span className="text-ink-3">none</span>
      ) : (
        <>
          <b className={verdict === 'met' ? 'is-note' : undefined}>{formatSigned(change * 100)}</b>
          {verdict === 'met' ? <span className="block font-sans text-[13px] leading-[18px] is-note">swelling</span> : null}
        </>
      ),
  },
  { id: 'nextCloses', header: 'Next window', sortable: true, cell: (row) => <NextWindow row={row} today={today} /> },
  {
    id: 'openQueries',
    header: 'Open queries',
    numeric: true,
    sortable: true,
    cell: ({ openQueries }) => (openQueries === 0 ? <span className="text-ink-3">0</span> : <b>{openQueries}</b>),
  },
  { id: 'state', header: 'State', cell: (row) => <Gauge {...standing(row)} /> },
];
