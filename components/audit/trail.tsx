'use client';

import { useInfiniteQuery } from '@tanstack/react-query';
import { useDeferredValue, useMemo, useState } from 'react';
import type { TrailFilter } from '@/lib/audit/input';
import type { TrailEntry, TrailPage } from '@/lib/audit/list-trail';
import { ProblemError, send } from '../api/send';
import { Button } from '../ui/button';
import { DataTable } from '../ui/data-table';
import { countOf, formatCount } from '../ui/format';
import type { Choice } from '../ui/select';
import { Empty } from '../ui/waiting';
import { TrailFilterSentence } from './trail-filter-sentence';
import { trailColumns } from './trail-rows';

const none: TrailFilter = { who: '', code: '', act: '', table: '', field: '', from: '', to: '' };
const pageSize = 50;
const rowId = (entry: TrailEntry): string => entry.id;

const address = (filter: TrailFilter): string => new URLSearchParams(Object.entries(filter).filter(([, value]) => value !== '')).toString();

export interface TrailProps {
  first: TrailPage;
  asked: TrailFilter;
  acts: readonly Choice[];
  tables: readonly Choice[];
  mayExport: boolean;
}

/** The trail: filtered in a sentence, read onwards by keyset. */
export function Trail({ first, asked, acts, tables, mayExport }: TrailProps) {
  const [filter, setFilter] = useState(asked);
  const query = useDeferredValue(address(filter));
  const [atFirst] = useState(query);
  const { data, error, isFetching, hasNextPage, fetchNextPage } = useInfiniteQuery({
    queryKey: ['audit', query],
    queryFn: ({ pageParam }) => send<TrailPage>('GET', `/api/audit?${query}&limit=${pageSize}${pageParam === null ? '' : `&before=${pageParam}`}`),
    initialPageParam: null as string | null,
    getNextPageParam: ({ nextBefore }) => nextBefore,
    ...(query === atFirst ? { initialData: { pages: [first], pageParams: [null] } } : {}),
  });
  const entries = useMemo(() => data?.pages.flatMap((page) => page.entries) ?? [], [data]);
  const [head] = data?.pages ?? [];
  const found = head ? `${head.foundAtLeast ? 'more than ' : ''}${formatCount(head.found)} found` : 'looking';
  return (
    <>
      <TrailFilterSentence {...{ filter, acts, tables, found }} change={(part) => setFilter((now) => ({ ...now, ...part }))} />
      {mayExport ? (
        <p className="mb-3">
          <a className="btn-link" href={`/api/audit/file?${query}`} download>
            Save these entries as CSV
          </a>
        </p>
      ) : null}
      <DataTable
        caption="Audit trail"
        columns={trailColumns}
        rows={entries}
        getRowId={rowId}
        loading={isFetching}
        error={error ? (error instanceof ProblemError ? error.problem.detail : 'The trail could not be read. Try again in a minute.') : undefined}
        empty={
          <Empty title="No entry answers to this" action={<Button kind="link" onClick={() => setFilter(none)}>Show the whole trail</Button>}>
            Only entries of the sites in your reach are shown.
          </Empty>
        }
      />
      <p className="mt-3 text-ink-2">
        Showing {countOf(entries.length, 'entry', 'entries')}.{' '}
        {hasNextPage ? (
          <Button kind="link" atWork={isFetching && 'Reading'} onClick={() => void fetchNextPage()}>
            Show the next {pageSize}
          </Button>
        ) : null}
      </p>
    </>
  );
}
