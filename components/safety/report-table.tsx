import Link from 'next/link';
import type { ReportRow } from '@/lib/safety/list-open-reports';
import { formatAge, formatMoment, formatNearDate, formatTime } from '../ui/format';
import { Gauge } from '../ui/gauge';
import { PlainTable } from '../ui/plain-table';

const urgencyWords = { 'emergency now': 'Emergency', 'same-day care': 'Same day', 'contact the site': 'Call', none: 'None' } as const;

/** The site's clock in words: what is left, or by how much it ran out. */
export function clockWords({ dueAt, isOverdue, state, timeZone }: Pick<ReportRow, 'dueAt' | 'isOverdue' | 'state' | 'timeZone'>, now: Date): string {
  if (dueAt === null) return 'nothing asked';
  const due = new Date(dueAt);
  if (state === 'reviewed') return formatMoment(due, timeZone);
  return `${formatNearDate(due, timeZone)}, ${formatTime(due, timeZone)}: ${isOverdue ? `ran out ${formatAge(due, now)}` : formatAge(due, now)}`;
}

/** Reports with their clock. */
export function ReportTable({ caption, rows, now }: { caption: string; rows: readonly ReportRow[]; now: Date }) {
  return (
    <PlainTable
      caption={caption}
      rows={rows}
      getRowId={({ id }) => id}
      columns={[
        { id: 'code', header: 'Participant', width: '110px', cell: (row) => <Link className="code-link" href={`/participants/${row.participantCode}`}>{row.participantCode}</Link> },
        { id: 'level', header: 'Level', width: '120px', cell: (row) => `${row.level}, ${urgencyWords[row.urgency].toLowerCase()}` },
        { id: 'said', header: 'What was said', cell: (row) => row.said },
        { id: 'reported', header: 'Reported', width: '150px', cell: (row) => formatMoment(new Date(row.reportedAt), row.timeZone) },
        { id: 'due', header: 'Answer by', cell: (row) => (row.isOverdue ? <b className="text-needs">{clockWords(row, now)}</b> : clockWords(row, now)) },
        { id: 'state', header: 'State', width: '150px', cell: (row) => <State row={row} /> },
        {
          id: 'open',
          header: 'Open',
          headerHidden: true,
          width: '80px',
          cell: (row) => (
            <Link className="font-semibold" href={`/safety/${row.id}`} aria-label={`${row.state === 'reviewed' ? 'Open' : 'Review'}: the report of ${row.participantCode}`}>
              {row.state === 'reviewed' ? 'Open' : 'Review'}
            </Link>
          ),
        },
      ]}
    />
  );
}

function State({ row: { state, outcome, isOverdue } }: { row: ReportRow }) {
  if (state === 'reviewed') return <Gauge state="done" word={outcome ?? 'Reviewed'} />;
  return <Gauge state={isOverdue || state === 'new' ? 'needs' : 'part'} level={state === 'new' ? 0.2 : 0.5} word={state === 'new' ? 'Not read yet' : 'Read'} />;
}
