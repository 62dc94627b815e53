import Link from 'next/link';
import type { FieldChange } from '@/lib/audit/changes-of';
import type { TrailEntry } from '@/lib/audit/list-trail';
import { countOf, formatCount, formatDate } from '../ui/format';
import { EarlierValue } from '../ui/note';
import type { TableColumn } from '../ui/plain-table';
import { valueWords } from './value-words';

/** A change is shown whole; of what was first entered, the beginning. */
const linesShown = { UPDATE: 8, INSERT: 2, DELETE: 2, EVENT: 4 } as const;

/** Hours with seconds, UTC: two entries of one minute must tell apart. */
const timeUtc = (at: string): string => at.slice(11, 19);

function ChangeLine({ change, op }: { change: FieldChange; op: TrailEntry['op'] }) {
  const { label, kind, before, after } = change;
  return (
    <span className="block">
      {label}{' '}
      {op === 'UPDATE' ? (
        <>
          {before === null ? <span className="text-ink-3">nothing</span> : <EarlierValue>{valueWords(before, kind)}</EarlierValue>} → <b>{valueWords(after, kind)}</b>
        </>
      ) : (
        <span className="text-ink-2">{valueWords(after ?? before, kind)}</span>
      )}
    </span>
  );
}

function What({ entry }: { entry: TrailEntry }) {
  const { subject, code, changes, op } = entry;
  const most = linesShown[op];
  const line = (change: FieldChange) => <ChangeLine key={change.column} change={change} op={op} />;
  return (
    <>
      {code ? (
        <Link className="code-link mr-2" href={`/participants/${code}`}>
          {code}
        </Link>
      ) : null}
      {subject}
      <span className="mt-0.5 block text-[13.5px] leading-[20px]">
        {changes.slice(0, most).map(line)}
        {changes.length > most ? (
          <details>
            <summary>{countOf(changes.length - most, 'more field')}</summary>
            {changes.slice(most).map(line)}
          </details>
        ) : null}
      </span>
    </>
  );
}

/** Columns of the trail. */
export const trailColumns: readonly TableColumn<TrailEntry>[] = [
  { id: 'entry', header: 'Entry', width: '84px', cell: ({ id }) => <span className="t-num">{formatCount(Number(id))}</span> },
  {
    id: 'at',
    header: 'When, UTC',
    width: '132px',
    cell: ({ at }) => (
      <>
        {formatDate(at.slice(0, 10))} <span className="t-num">{timeUtc(at)}</span>
      </>
    ),
  },
  { id: 'who', header: 'Who', width: '104px', cell: ({ who }) => <b>{who}</b> },
  { id: 'did', header: 'Did', width: '132px', cell: ({ did }) => <b>{did}</b> },
  { id: 'what', header: 'To what', cell: (entry) => <What entry={entry} /> },
  {
    id: 'reason',
    header: 'Reason given',
    width: '230px',
    cell: ({ reason }) => (reason ? <span className="font-serif text-[16px] leading-[22px]">“{reason}”</span> : <span className="text-ink-3">none asked</span>),
  },
  {
    id: 'seal',
    header: 'Seal',
    width: '104px',
    cell: ({ hash, isSealed }) => (
      <>
        <span className="t-num">{`${hash.slice(0, 4)} ${hash.slice(4, 8)}`}</span>
        {isSealed ? null : <span className="block text-[13px] text-ink-3">not yet sealed</span>}
      </>
    ),
  },
];
