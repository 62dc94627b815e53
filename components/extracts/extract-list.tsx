import Link from 'next/link';
import type { ExtractView } from '@/lib/extracts/view-extract';
import { formatCount, formatDate } from '../ui/format';
import { Gauge } from '../ui/gauge';
import { PlainTable } from '../ui/plain-table';
import { Empty } from '../ui/waiting';
import { profileWords, shortSum, standing } from './words';

/** The ledger of data sets: who asked, for what, how many people, and the checksum of the checksums. */
export function ExtractList({ extracts }: { extracts: readonly ExtractView[] }) {
  if (extracts.length === 0) return <Empty title="Nothing has left yet">A data set that is asked for stands here for good: who asked, for what, what was left out, and the checksum of every file.</Empty>;
  const sumOf = ({ files }: ExtractView) => files.find(({ name }) => name === 'checksums.txt')?.sha256;
  return (
    <PlainTable
      caption="Extracts, newest first"
      rows={extracts}
      getRowId={({ id }) => id}
      columns={[
        { id: 'number', header: 'Extract', cell: ({ id, number }) => <Link className="t-num font-semibold" href={`/extracts/${id}`}>{number}</Link> },
        { id: 'asked', header: 'Asked for', cell: ({ requestedAt, requestedLabel }) => `${formatDate(new Date(requestedAt))}, ${requestedLabel}` },
        { id: 'profile', header: 'Profile', cell: ({ profile }) => profileWords[profile] },
        { id: 'to', header: 'To', cell: ({ recipient }) => recipient },
        { id: 'for', header: 'For', cell: ({ purpose }) => purpose },
        { id: 'people', header: 'People', numeric: true, cell: ({ state, counts }) => (state === 'ready' ? formatCount(counts['included'] ?? 0) : '') },
        { id: 'sum', header: 'Checksums, SHA-256', cell: (extract) => <span className="t-num text-[13.5px]">{sumOf(extract) ? shortSum(sumOf(extract) ?? '') : ''}</span> },
        { id: 'state', header: 'State', cell: (extract) => <Gauge {...standing(extract)} /> },
      ]}
    />
  );
}
