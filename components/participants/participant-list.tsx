'use client';

import { keepPreviousData, useQuery } from '@tanstack/react-query';
import type { PaginationState, SortingState } from '@tanstack/react-table';
import { useDeferredValue, useMemo, useState } from 'react';
import type { ListParticipantsInput } from '@/lib/participants/input';
import type { ParticipantChoices } from '@/lib/participants/list-choices';
import type { ParticipantPage, ParticipantRow } from '@/lib/participants/list-participants';
import { ProblemError, send } from '../api/send';
import { Button } from '../ui/button';
import { DataTable } from '../ui/data-table';
import { countOf } from '../ui/format';
import { ChoiceInSentence, ValueInSentence } from '../ui/in-sentence';
import { Empty } from '../ui/waiting';
import { participantColumns } from './participant-columns';

export interface ParticipantListProps {
  first: ParticipantPage;
  /** What `first` answers. */
  asked: ListParticipantsInput;
  choices: ParticipantChoices;
  today: string;
}

type Filters = Pick<ListParticipantsInput, 'q' | 'swelling'> & { siteId: string; cohort: string; state: string };

const every = '';
const none: Filters = { q: '', swelling: 'any', siteId: every, cohort: every, state: every };

const address = (filters: Filters, { pageIndex, pageSize }: PaginationState, [sort]: SortingState): string =>
  new URLSearchParams({
    page: String(pageIndex),
    pageSize: String(pageSize),
    sort: sort?.id ?? 'code',
    direction: sort?.desc ? 'desc' : 'asc',
    swelling: filters.swelling,
    ...Object.fromEntries((['q', 'siteId', 'cohort', 'state'] as const).flatMap((key) => (filters[key] === every ? [] : [[key, filters[key]]]))),
  }).toString();

const rowId = (row: ParticipantRow): string => row.id;

/** The participants in reach: filtered in a sentence, sorted and paged by the server. */
export function ParticipantList({ first, asked, choices, today }: ParticipantListProps) {
  const [filters, setFilters] = useState<Filters>({ ...none, q: asked.q });
  const [pagination, setPagination] = useState<PaginationState>({ pageIndex: 0, pageSize: asked.pageSize });
  const [sorting, setSorting] = useState<SortingState>([{ id: asked.sort, desc: asked.direction === 'desc' }]);
  // A letter typed is shown at once; the server is asked when the typing rests.
  const query = useDeferredValue(address(filters, pagination, sorting));
  const [atFirst] = useState(query);
  const { data, error, isFetching } = useQuery({
    queryKey: ['participants', query],
    queryFn: () => send<ParticipantPage>('GET', `/api/participants?${query}`),
    placeholderData: keepPreviousData,
    ...(query === atFirst ? { initialData: first } : {}),
  });
  const page = data ?? first;
  const change = (part: Partial<Filters>) => {
    setFilters((now) => ({ ...now, ...part }));
    setPagination((now) => ({ ...now, pageIndex: 0 }));
  };
  const columns = useMemo(() => participantColumns(today, choices.sites.length > 1), [today, choices.sites.length]);
  return (
    <>
      <FilterSentence {...{ filters, change, choices }} found={page.rowCount} />
      <DataTable
        caption="Participants"
        columns={columns}
        rows={page.rows}
        rowCount={page.rowCount}
        getRowId={rowId}
        pagination={pagination}
        onPaginationChange={setPagination}
        sorting={sorting}
        onSortingChange={(next) => {
          setSorting(next);
          setPagination((now) => ({ ...now, pageIndex: 0 }));
        }}
        loading={isFetching}
        error={error ? (error instanceof ProblemError ? error.problem.detail : 'The list could not be had. Try again in a minute.') : undefined}
        empty={
          <Empty title="No participant answers to this" action={<Button kind="link" onClick={() => change(none)}>Show all participants</Button>}>
            Codes look like NM-00420: the site, a number, a check character.
          </Empty>
        }
      />
    </>
  );
}

function FilterSentence({ filters, change, choices, found }: { filters: Filters; change: (part: Partial<Filters>) => void; choices: ParticipantChoices; found: number }) {
  const { sites, cohorts, primaryName } = choices;
  return (
    <p className="t-prose mt-3 mb-2 !text-[19px] !leading-[36px]" role="search" aria-label="Which participants">
      Participants
      {sites.length > 1 ? (
        <>
          {' at '}
          <ChoiceInSentence
            label="site"
            value={filters.siteId}
            onChange={({ target }) => change({ siteId: target.value })}
            choices={[{ value: every, label: 'every site' }, ...sites.map(({ id, name }) => ({ value: id, label: name }))]}
          />
        </>
      ) : null}{' '}
      of{' '}
      <ChoiceInSentence
        label="cohort"
        value={filters.cohort}
        onChange={({ target }) => change({ cohort: target.value })}
        choices={[{ value: every, label: 'every cohort' }, ...cohorts.map(({ key, name }) => ({ value: key, label: name }))]}
      />
      , who are{' '}
      <ChoiceInSentence
        label="state"
        value={filters.state}
        onChange={({ target }) => change({ state: target.value })}
        choices={[
          { value: every, label: 'in any state' },
          { value: 'enrolled', label: 'in the study' },
          { value: 'withdrawn', label: 'withdrawn' },
          { value: 'completed', label: 'completed' },
        ]}
      />
      , with {primaryName}{' '}
      <ChoiceInSentence
        label={`swelling by ${primaryName} at the last assessment`}
        value={filters.swelling}
        onChange={({ target }) => change({ swelling: target.value as Filters['swelling'] })}
        choices={[
          { value: 'any', label: 'met or not' },
          { value: 'met', label: 'met' },
          { value: 'not met', label: 'not met' },
          { value: 'not judged', label: 'not judged' },
        ]}
      />
      , code{' '}
      <ValueInSentence label="part of the code" value={filters.q} placeholder="any" size={9} onChange={({ target }) => change({ q: target.value })} />.{' '}
      <span className="t-small text-ink-2" role="status">
        {countOf(found, 'participant')}
      </span>
    </p>
  );
}
