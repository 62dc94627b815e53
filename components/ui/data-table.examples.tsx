'use client';

import { useMemo, useState } from 'react';
import { AgeSpan } from '../chart/small-charts';
import { Button } from './button';
import { DataTable } from './data-table';
import type { TableColumn } from './plain-table';
import { BulkTray } from './table-parts';
import { Empty } from './waiting';

interface QueryRow {
  id: string;
  participant: string;
  field: string;
  question: string;
  days: number;
  who: string;
}

const all: readonly QueryRow[] = [
  {
    id: 'Q-0397',
    participant: 'KB-0018',
    field: 'Tape, right 36 cm',
    question: 'Five cm over baseline, weight unchanged. Read twice?',
    days: 29,
    who: 'Kestrel Bay',
  },
  {
    id: 'Q-0418',
    participant: 'NM-0033',
    field: 'Tape, left 20 cm',
    question: 'Trials 1.9 cm apart. Which stands?',
    days: 21,
    who: 'Northmoor',
  },
  {
    id: 'Q-0427',
    participant: 'NM-0042',
    field: 'Tape, left 24 cm',
    question: 'Trials 1.7 cm apart. Had the elbow moved?',
    days: 19,
    who: 'You',
  },
  {
    id: 'Q-0438',
    participant: 'NM-0051',
    field: 'Consent time',
    question: 'Signed 20 minutes after the first form.',
    days: 6,
    who: 'Northmoor',
  },
];

const columns: readonly TableColumn<QueryRow>[] = [
  { id: 'number', header: 'Query', sortable: true, width: '92px', cell: (row) => <b className="t-num">{row.id}</b> },
  {
    id: 'participant',
    header: 'Participant',
    sortable: true,
    cell: (row) => (
      <a className="code-link" href="#tables">
        {row.participant}
      </a>
    ),
  },
  {
    id: 'field',
    header: 'Field and question',
    cell: (row) => (
      <>
        <b>{row.field}</b>
        <br />
        <span className="t-hand text-[16.5px] leading-[22px]">{row.question}</span>
      </>
    ),
  },
  { id: 'age', header: 'Days since asked', sortable: true, width: '216px', cell: (row) => <AgeSpan days={row.days} limitDays={14} /> },
  {
    id: 'who',
    header: 'Who must act',
    cell: (row) => <b className={row.days > 14 && row.who !== 'You' ? 'is-needs' : undefined}>{row.who}</b>,
  },
];

const idOf = (row: QueryRow) => row.id;

/** The one table with paging, sorting and bulk choice, as a server would answer. */
export function DataTableExamples() {
  const [pagination, setPagination] = useState({ pageIndex: 0, pageSize: 3 });
  const [sorting, setSorting] = useState([{ id: 'age', desc: true }]);
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set(['Q-0427']));
  const rows = useMemo(() => {
    const by = sorting[0];
    const value = (row: QueryRow) => (by?.id === 'age' ? row.days : by?.id === 'participant' ? row.participant : row.id);
    const sorted = [...all].sort((a, b) => (value(a) < value(b) ? -1 : 1) * (by?.desc ? -1 : 1));
    return sorted.slice(pagination.pageIndex * pagination.pageSize, (pagination.pageIndex + 1) * pagination.pageSize);
  }, [sorting, pagination]);
  return (
    <DataTable
      caption="Queries"
      columns={columns}
      rows={rows}
      rowCount={all.length}
      getRowId={idOf}
      pagination={pagination}
      onPaginationChange={setPagination}
      sorting={sorting}
      onSortingChange={setSorting}
      empty={<Empty title="No queries wait on you" />}
      choice={{
        chosen,
        onChange: setChosen,
        noun: 'query',
        tray: (
          <BulkTray
            title={`${chosen.size} chosen, all answered`}
            action={
              <Button kind="primary" size="small">
                Close {chosen.size} {chosen.size === 1 ? 'query' : 'queries'}
              </Button>
            }
            onClear={() => setChosen(new Set())}
          />
        ),
      }}
    />
  );
}

const none: readonly QueryRow[] = [];

/** Empty, waiting and refused. */
export function DataTableStatesExamples() {
  return (
    <div className="grid gap-8">
      <DataTable
        caption="Queries, none"
        columns={columns}
        rows={none}
        getRowId={idOf}
        empty={<Empty title="No queries wait on you">The last was closed on 1 Mar 2027.</Empty>}
      />
      <DataTable caption="Queries, loading" columns={columns} rows={none} getRowId={idOf} loading empty={<Empty title="No queries" />} />
      <DataTable
        caption="Queries, refused"
        columns={columns}
        rows={none}
        getRowId={idOf}
        error="The list could not be had. Try again in a minute."
        empty={<Empty title="No queries" />}
      />
    </div>
  );
}
