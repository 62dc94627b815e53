'use client';
import Link from 'next/link';
import { useRouter } from 'next/navigation';
import type { FlagRow } from '@/lib/training/list-flags';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { formatDate } from '../ui/format';
import { PlainTable } from '../ui/plain-table';
import { useToast } from '../ui/toast';

const figure = (value: number | null): string => (value === null ? '' : String(Number(value.toFixed(2))));

/** From what to what. */
function change({ detail: { load, previousLoad, lastWeekLoad, key } }: FlagRow): string {
  if (load === null) return '';
  const unit = key?.includes('|band|') ? 'level' : 'kg';
  const from = lastWeekLoad ?? previousLoad;
  return from === null ? `${figure(load)} ${unit}` : `${figure(from)} to ${figure(load)} ${unit}`;
}

/** Training that met a rule of safety or a candidate deviation, for somebody at the site to see. */
export function FlagList({ flags, maySee }: { flags: readonly FlagRow[]; maySee: boolean }) {
  return (
    <PlainTable
      caption="Training flags that nobody has seen"
      rows={flags}
      getRowId={({ id }) => id}
      columns={[
        { id: 'code', header: 'Participant', width: '110px', cell: (row) => <Link className="font-semibold" href={`/participants/${row.participantCode}`}>{row.participantCode}</Link> },
        { id: 'on', header: 'Session of', width: '110px', cell: (row) => formatDate(row.detail.on) },
        { id: 'rule', header: 'What', cell: (row) => (row.detail.severity === 'safety' ? <b>{row.title}</b> : row.title) },
        { id: 'exercise', header: 'Exercise', cell: (row) => row.exercise ?? 'the session' },
        { id: 'load', header: 'Load', cell: change },
        { id: 'see', header: 'Seen', headerHidden: true, width: '70px', cell: (row) => (maySee ? <See id={row.id} code={row.participantCode} /> : null) },
      ]}
    />
  );
}

function See({ id, code }: { id: string; code: string }) {
  const router = useRouter();
  const { say } = useToast();
  const seen = useSend<FlagRow>('POST', `/api/flags/${id}/seen`);
  const press = () =>
    seen.mutate(
      {},
      {
        onSuccess: () => router.refresh(),
        onError: (error) => say({ kind: 'needs', word: 'Not marked.', text: error.message }),
      },
    );
  return (
    <Button kind="link" atWork={seen.isPending && 'Saving'} onClick={press} aria-label={`Mark the flag of ${code} as seen`}>
      Seen
    </Button>
  );
}
