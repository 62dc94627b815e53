'use client';

import { keepPreviousData, useQuery, useQueryClient } from '@tanstack/react-query';
import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import type { QueryPage, QueryRow } from '@/lib/queries/list-queries';
import { AgeSpan } from '../chart/small-charts';
import { send } from '../api/send';
import { useSend } from '../api/use-send';
import { queryNumber } from '../margin/query-note';
import { Button } from '../ui/button';
import { DataTable } from '../ui/data-table';
import { countOf, formatDate } from '../ui/format';
import { ChoiceInSentence } from '../ui/in-sentence';
import { Columns, MarginPart } from '../ui/page';
import type { TableColumn } from '../ui/plain-table';
import { Select } from '../ui/select';
import { BulkTray } from '../ui/table-parts';
import { useToast } from '../ui/toast';
import { Empty } from '../ui/waiting';
import { SiteAges } from './site-ages';

export interface QueriesListProps {
  first: QueryPage;
  /** Days after which a query is past the limit. */
  limitDays: number;
  /** Monitors and data managers close; sites answer. */
  mayClose: boolean;
}

interface Filter {
  states: string;
  siteId: string;
  olderThanDays: string;
}

const none: readonly QueryRow[] = [];
const idOf = (row: QueryRow): string => row.id;
const stateChoices = [
  { value: 'open,answered', label: 'open or answered' },
  { value: 'open', label: 'open' },
  { value: 'answered', label: 'answered' },
  { value: 'closed', label: 'closed' },
  { value: 'cancelled', label: 'withdrawn' },
  { value: 'open,answered,closed,cancelled', label: 'in any state' },
];
const ageChoices = ['0', '7', '14', '28', '90'].map((value) => ({ value, label: `${value} days` }));
const closeReasons = ['Value agrees with the source', 'Explanation accepted', 'Value corrected at the site'].map((value) => ({ value, label: value }));
const firstFilter: Filter = { states: 'open,answered', siteId: '', olderThanDays: '0' };
const firstPage = { pageIndex: 0, pageSize: 25 };
const firstSort = [{ id: 'raisedAt', desc: false }];

function addressOf({ states, siteId, olderThanDays }: Filter, page: typeof firstPage, sort: typeof firstSort): string {
  const [by] = sort;
  const query = new URLSearchParams({ states, olderThanDays, page: String(page.pageIndex), pageSize: String(page.pageSize), sort: by?.id ?? 'raisedAt', direction: by?.desc ? 'desc' : 'asc' });
  if (siteId) query.set('siteId', siteId);
  return `/api/queries?${query.toString()}`;
}

/** Where a query stands in the margin. */
const placeOf = ({ participantCode, visitId, id }: QueryRow): string =>
  visitId ? `/participants/${participantCode}/visits/${visitId}#query-${id}` : `/participants/${participantCode}#query-${id}`;

/** Every query in reach: filtered by a sentence, paged and sorted on the server, closed several at once. */
export function QueriesList({ first, limitDays, mayClose }: QueriesListProps) {
  const [filter, setFilter] = useState(firstFilter);
  const [pagination, setPagination] = useState(firstPage);
  const [sorting, setSorting] = useState(firstSort);
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const address = addressOf(filter, pagination, sorting);
  const isFirst = address === addressOf(firstFilter, firstPage, firstSort);
  const found = useQuery({ queryKey: ['queries', address], queryFn: () => send<QueryPage>('GET', address), placeholderData: keepPreviousData, ...(isFirst ? { initialData: first } : {}) });
  const rows = found.data?.rows ?? none;
  const sites = found.data?.sites ?? first.sites;
  const columns = useColumns(limitDays, mayClose);
  const narrow = (change: Partial<Filter>) => {
    setFilter((before) => ({ ...before, ...change }));
    setPagination(firstPage);
    setChosen(new Set());
  };
  const late = sites.filter(({ siteId }) => !filter.siteId || siteId === filter.siteId).reduce((sum, site) => sum + site.late, 0);
  return (
    <>
      <p className="queries-sentence">
        Queries that are <ChoiceInSentence label="status" choices={stateChoices} value={filter.states} onChange={(event) => narrow({ states: event.target.value })} /> at{' '}
        <ChoiceInSentence label="site" choices={siteChoices(sites)} value={filter.siteId} onChange={(event) => narrow({ siteId: event.target.value })} />, older than{' '}
        <ChoiceInSentence label="age" choices={ageChoices} value={filter.olderThanDays} onChange={(event) => narrow({ olderThanDays: event.target.value })} />, {orderWords(sorting)}.{' '}
        <span className="found" role="status">
          {found.data ? `${countOf(found.data.rowCount, 'query', 'queries')} found, ${late === 0 ? 'none' : late} past the limit without an answer.` : ''}
        </span>
      </p>
      <Columns
        marginLabel="How old, and with whom"
        margin={
          <>
            <MarginPart title="How old, and with whom">
              <SiteAges sites={sites} limitDays={limitDays} answeredWords={mayClose ? 'answered, to close' : 'answered'} />
            </MarginPart>
            <MarginPart>
              <p className="t-small text-ink-2">
                {mayClose ? 'A site answers; only who asks closes. Closing writes the reason and the time into the field’s history. It cannot be undone; a new query can be opened.' : 'Answer in the margin, beside the value. Correct the value there with a reason, and the query is answered in the same breath.'}
              </p>
            </MarginPart>
          </>
        }
      >
        <DataTable
          caption="Data queries"
          columns={columns}
          rows={rows}
          getRowId={idOf}
          rowCount={found.data?.rowCount ?? 0}
          pagination={pagination}
          onPaginationChange={(next) => {
            setPagination(next);
            setChosen(new Set());
          }}
          sorting={sorting}
          onSortingChange={setSorting}
          loading={found.isPending}
          error={found.error?.message}
          empty={<Empty title="No query waits here">Change the sentence above to see those that were closed.</Empty>}
          {...(mayClose ? { choice: { chosen, onChange: setChosen, noun: 'query', tray: <CloseTray chosen={rows.filter(({ id }) => chosen.has(id))} onClear={() => setChosen(new Set())} /> } } : {})}
        />
      </Columns>
    </>
  );
}

const counts = ['no', 'one', 'both', 'all three', 'all four', 'all five'];
const siteChoices = (sites: QueryPage['sites']) => [
  ...(sites.length === 1 ? [] : [{ value: '', label: `${counts[sites.length] ?? `all ${sites.length}`} sites` }]),
  ...sites.map(({ siteId, siteName }) => ({ value: sites.length === 1 ? '' : siteId, label: siteName })),
];

const orders: Record<string, readonly [string, string]> = {
  raisedAt: ['oldest first', 'newest first'],
  number: ['lowest number first', 'highest number first'],
  participant: ['by participant', 'by participant, from the last'],
  state: ['by state', 'by state, from the last'],
};
const orderWords = ([by]: typeof firstSort): string => orders[by?.id ?? 'raisedAt']?.[by?.desc ? 1 : 0] ?? 'oldest first';

/** How the last turn of the thread reads in one line. */
function lastWords({ state, lastKind, lastText, lastLabel }: QueryRow): string {
  if (state === 'answered' || state === 'closed') return lastText;
  if (state === 'cancelled') return `Withdrawn: ${lastText}`;
  return lastKind === 'ask again' || lastKind === 'reopen' ? `Asked again by ${lastLabel}` : 'No answer';
}

function useColumns(limitDays: number, mayClose: boolean): readonly TableColumn<QueryRow>[] {
  return useMemo(
    () => [
      { id: 'number', header: 'Query', sortable: true, width: '84px', cell: (row) => <b className="t-num">{queryNumber(row.number)}</b> },
      {
        id: 'participant',
        header: 'Participant',
        sortable: true,
        width: '108px',
        cell: (row) => (
          <>
            <Link className="code-link" href={placeOf(row)}>
              {row.participantCode}
            </Link>
            <br />
            <span className="t-small text-ink-2">{row.visitName ?? 'Record'}</span>
          </>
        ),
      },
      {
        id: 'field',
        header: 'Field and question',
        cell: (row) => (
          <>
            <b>{row.fieldLabel}</b>
            <br />
            <span className="t-hand queries-question">{row.question}</span>
          </>
        ),
      },
      { id: 'raisedAt', header: 'Days since asked', sortable: true, width: '216px', cell: (row) => <AgeCell row={row} limitDays={limitDays} /> },
      {
        id: 'state',
        header: 'Who must act',
        sortable: true,
        width: '200px',
        cell: (row) => {
          const isLate = row.state === 'open' && row.ageDays > limitDays;
          return (
            <>
              <b className={isLate ? 'is-needs' : undefined}>{whoActs(row, mayClose)}</b>
              <br />
              <span className="t-small text-ink-2">{lastWords(row)}</span>
            </>
          );
        },
      },
    ],
    [limitDays, mayClose],
  );
}

function AgeCell({ row, limitDays }: { row: QueryRow; limitDays: number }) {
  if (row.state === 'closed' || row.state === 'cancelled') return <span className="t-small text-ink-2">asked {formatDate(row.raisedAt.slice(0, 10))}</span>;
  return <AgeSpan days={row.ageDays} limitDays={limitDays} />;
}

function whoActs({ state, siteName }: QueryRow, mayClose: boolean): string {
  if (state === 'open') return mayClose ? siteName : 'You';
  if (state === 'answered') return mayClose ? 'You' : 'The monitor';
  return state === 'closed' ? 'Closed' : 'Withdrawn';
}

/** Closes the chosen queries for one reason: all of them, or none. */
function CloseTray({ chosen, onClear }: { chosen: readonly QueryRow[]; onClear: () => void }) {
  const [reason, setReason] = useState(closeReasons[0]?.value ?? '');
  const [refusal, setRefusal] = useState<string | null>(null);
  const close = useSend<{ closed: number }, { ids: string[]; reason: string }>('POST', '/api/queries/close');
  const client = useQueryClient();
  const router = useRouter();
  const { say } = useToast();
  const answered = chosen.filter(({ state }) => state === 'answered').length;
  const press = () => {
    const rest = chosen.length - answered;
    if (rest > 0) return setRefusal(`${countOf(rest, 'query', 'queries')} of these ${rest === 1 ? 'is' : 'are'} not answered. Only answered queries are closed; leave ${rest === 1 ? 'it' : 'them'} out.`);
    close.mutate(
      { ids: chosen.map(({ id }) => id), reason },
      {
        onSuccess: ({ closed }) => {
          say({ kind: 'fine', word: 'Closed.', text: countOf(closed, 'query', 'queries') });
          onClear();
          void client.invalidateQueries({ queryKey: ['queries'] });
          router.refresh();
        },
        onError: ({ problem }) => setRefusal(problem.detail),
      },
    );
  };
  return (
    <BulkTray
      title={`${chosen.length} chosen, ${answered === chosen.length ? 'all' : answered} answered`}
      action={
        <Button kind="primary" size="small" atWork={close.isPending ? 'Closing' : false} onClick={press}>
          Close {countOf(chosen.length, 'query', 'queries')}
        </Button>
      }
      onClear={onClear}
    >
      {refusal && answered !== chosen.length ? (
        <p role="alert" className="is-needs basis-full">
          {refusal}
        </p>
      ) : null}
      <Select label="Close because" labelHidden choices={closeReasons} value={reason} onChange={(event) => setReason(event.target.value)} />
    </BulkTray>
  );
}
