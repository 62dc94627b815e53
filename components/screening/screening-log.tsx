'use client';

import { keepPreviousData, useQuery } from '@tanstack/react-query';
import type { PaginationState, SortingState } from '@tanstack/react-table';
import Link from 'next/link';
import { useMemo, useState } from 'react';
import type { ScreeningPage, ScreeningRow } from '@/lib/enrolment/list-screenings';
import { ProblemError, send } from '../api/send';
import { DataTable } from '../ui/data-table';
import { formatDate } from '../ui/format';
import { Gauge, type GaugeState } from '../ui/gauge';
import type { TableColumn } from '../ui/plain-table';
import { Tabs } from '../ui/tabs';
import { Empty } from '../ui/waiting';

const pageSize = 25;

/** Where a screening stands, as a word and a level. */
function standing({ state, isEligible, consentState, notEnrolledReason, participantCode }: ScreeningRow): { state: GaugeState; word: string; level?: number } {
  if (state === 'enrolled') return { state: 'done', word: `Enrolled as ${participantCode ?? ''}` };
  if (state === 'not enrolled') return { state: 'closed', word: notEnrolledReason ?? 'Not enrolled' };
  if (consentState === 'complete') return isEligible ? { state: 'needs', word: 'To enrol', level: 0.9 } : { state: 'needs', word: 'Eligibility to confirm', level: 0.7 };
  if (consentState === 'signed by participant') return { state: 'needs', word: 'Second signature', level: 0.7 };
  if (consentState === 'reading') return { state: 'waiting', word: 'Reading the consent form', level: 0.5 };
  return isEligible ? { state: 'part', word: 'Eligible, no consent yet', level: 0.4 } : { state: 'part', word: 'Eligibility open', level: 0.2 };
}

const columns: readonly TableColumn<ScreeningRow>[] = [
  { id: 'number', header: 'Screening', sortable: true, cell: ({ id, siteCode, number }) => <Link className="t-num" href={`/screening/${id}`}>{`${siteCode}-S${String(number).padStart(4, '0')}`}</Link> },
  { id: 'site', header: 'Site', cell: ({ siteName }) => siteName },
  { id: 'screenedOn', header: 'Screened', sortable: true, cell: ({ screenedOn }) => formatDate(screenedOn) },
  { id: 'cohort', header: 'Cohort', cell: ({ cohort }) => cohort },
  { id: 'state', header: 'State', sortable: true, cell: (row) => <Gauge {...standing(row)} /> },
];

const kinds = [
  { key: 'all', label: 'All', count: 'screened' },
  { key: 'screening', label: 'Open', count: 'open' },
  { key: 'enrolled', label: 'Enrolled', count: 'enrolled' },
  { key: 'not enrolled', label: 'Not enrolled', count: 'notEnrolled' },
] as const;

/** The screening log, paged and sorted by the server. */
export function ScreeningLog({ first }: { first: ScreeningPage }) {
  const [kind, setKind] = useState<string>('all');
  const [pagination, setPagination] = useState<PaginationState>({ pageIndex: 0, pageSize });
  const [sorting, setSorting] = useState<SortingState>([{ id: 'screenedOn', desc: true }]);
  const query = useMemo(() => {
    const [sort] = sorting;
    return new URLSearchParams({
      page: String(pagination.pageIndex),
      pageSize: String(pageSize),
      sort: sort?.id ?? 'screenedOn',
      direction: (sort?.desc ?? true) ? 'desc' : 'asc',
      ...(kind === 'all' ? {} : { state: kind }),
    }).toString();
  }, [pagination, sorting, kind]);
  const [atFirst] = useState(query);
  const { data, error, isFetching } = useQuery({
    queryKey: ['screenings', query],
    queryFn: () => send<ScreeningPage>('GET', `/api/screenings?${query}`),
    placeholderData: keepPreviousData,
    ...(query === atFirst ? { initialData: first } : {}),
  });
  const page = data ?? first;
  return (
    <>
      <Tabs
        label="Which screenings"
        current={kind}
        onChoose={(key) => {
          setKind(key);
          setPagination({ pageIndex: 0, pageSize });
        }}
        tabs={kinds.map(({ key, label, count }) => ({ key, label, count: page.counts[count] }))}
      />
      <DataTable
        caption="Screening log"
        columns={columns}
        rows={page.rows}
        getRowId={({ id }) => id}
        rowCount={page.rowCount}
        pagination={pagination}
        onPaginationChange={setPagination}
        sorting={sorting}
        onSortingChange={setSorting}
        loading={isFetching}
        error={error ? (error instanceof ProblemError ? error.problem.detail : 'The list could not be had. Load the page again.') : undefined}
        empty={<Empty title="Nobody here yet">A screening is opened for every person considered, enrolled or not, so that the participant flow is whole.</Empty>}
      />
    </>
  );
}
