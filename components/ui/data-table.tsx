'use client';

import {
  createColumnHelper,
  rowPaginationFeature,
  rowSortingFeature,
  tableFeatures,
  useTable,
  type OnChangeFn,
  type PaginationState,
  type RowData,
  type SortingState,
} from '@tanstack/react-table';
import { Fragment, useMemo, type ReactNode } from 'react';
import type { TableColumn } from './plain-table';
import { Pager } from './pager';
import { TableHeadCell, ChooseAll, ChooseRow } from './table-parts';
import { Waterlines } from './waiting';

const features = tableFeatures({ rowPaginationFeature, rowSortingFeature });

export interface TableChoice {
  /** Ids of the chosen rows. */
  chosen: ReadonlySet<string>;
  onChange: (chosen: ReadonlySet<string>) => void;
  /** What is chosen, for a reader: 'query'. */
  noun: string;
  /** Stands over the head while something is chosen: BulkTray. */
  tray?: ReactNode;
}

export interface DataTableProps<Row extends RowData> {
  /** What the table holds; read aloud, hidden from the eye unless `captionShown`. */
  caption: string;
  captionShown?: boolean;
  columns: readonly TableColumn<Row>[];
  /** Keep the array stable between renders (state, memo or a query's data). */
  rows: readonly Row[];
  getRowId: (row: Row) => string;
  /** Rows on the server in all; leave out when every row is here, then nothing is paged. */
  rowCount?: number;
  pagination?: PaginationState;
  onPaginationChange?: OnChangeFn<PaginationState>;
  /** Sorting happens on the server; a column takes part when it is `sortable`. */
  sorting?: SortingState;
  onSortingChange?: OnChangeFn<SortingState>;
  loading?: boolean;
  /** The sentence to show when the rows could not be had. */
  error?: string | undefined;
  /** An `Empty` for when there are none. */
  empty: ReactNode;
  choice?: TableChoice;
  /** The row that is open, washed and marked for a reader. */
  currentRowId?: string | undefined;
  /** A second line under a row, across all columns; null for none. */
  detail?: (row: Row) => ReactNode;
}

/**
 * The one table. Head sticks, hairlines, no stripes; figures to the right in
 * the mono; at 390 px each row becomes lines of 'label value'.
 */
export function DataTable<Row extends RowData>(props: DataTableProps<Row>) {
  const { caption, captionShown, rows, getRowId, loading, error, empty, choice, currentRowId, detail } = props;
  const { table, paged } = useRows(props);
  const ids = useMemo(() => rows.map(getRowId), [rows, getRowId]);
  const span = props.columns.length + (choice ? 1 : 0);
  const shown = table.getRowModel().rows;
  return (
    <div className="data-table-frame">
      {choice && choice.chosen.size > 0 ? choice.tray : null}
      <table role="table" className="data-table" aria-busy={loading ? true : undefined}>
        <caption className={captionShown ? 'data-table-caption' : 'sr-only'}>{caption}</caption>
        <thead role="rowgroup">
          {table.getHeaderGroups().map((group) => (
            <tr role="row" key={group.id}>
              {choice ? <ChooseAll choice={choice} ids={ids} /> : null}
              {group.headers.map((header) => {
                const column = props.columns.find((one) => one.id === header.column.id);
                return column ? (
                  <TableHeadCell
                    key={header.id}
                    column={column}
                    sorted={header.column.getIsSorted()}
                    onSort={column.sortable ? () => header.column.toggleSorting() : undefined}
                  />
                ) : null;
              })}
            </tr>
          ))}
        </thead>
        <tbody role="rowgroup">
          {shown.map((row) => {
            const below = detail?.(row.original);
            return (
              <Fragment key={row.id}>
                <tr
                  role="row"
                  className={rowClass(choice?.chosen.has(row.id), row.id === currentRowId)}
                  aria-current={row.id === currentRowId ? 'true' : undefined}
                >
                  {choice ? <ChooseRow choice={choice} id={row.id} /> : null}
                  {row.getAllCells().map((cell) => {
                    const column = props.columns.find((one) => one.id === cell.column.id);
                    return (
                      <td role="cell" key={cell.id} data-label={column?.header} className={column?.numeric ? 'numeric' : undefined}>
                        {column?.cell(row.original)}
                      </td>
                    );
                  })}
                </tr>
                {below ? (
                  <tr role="row" className="data-table-detail">
                    <td role="cell" colSpan={span}>
                      {below}
                    </td>
                  </tr>
                ) : null}
              </Fragment>
            );
          })}
        </tbody>
      </table>
      {shown.length === 0 && !error ? loading ? <Waiting /> : empty : null}
      {error ? (
        <p role="alert" className="is-needs py-4">
          {error}
        </p>
      ) : null}
      {paged ? (
        <Pager
          pageIndex={table.state.pagination.pageIndex}
          pageSize={table.state.pagination.pageSize}
          rowCount={props.rowCount ?? 0}
          onPage={(page) => table.setPageIndex(page)}
        />
      ) : null}
    </div>
  );
}

function Waiting() {
  return (
    <div className="py-5">
      <Waterlines widths={[420, 380, 440]} label="Loading the list" />
    </div>
  );
}

function rowClass(chosen: boolean | undefined, current: boolean): string | undefined {
  if (chosen) return 'row-chosen';
  return current ? 'row-current' : undefined;
}

function useRows<Row extends RowData>({
  columns,
  rows,
  rowCount,
  pagination,
  sorting,
  getRowId,
  onPaginationChange,
  onSortingChange,
}: DataTableProps<Row>) {
  const defs = useMemo(() => {
    const helper = createColumnHelper<typeof features, Row>();
    return helper.columns(
      columns.map((column) => helper.display({ id: column.id, header: column.header, enableSorting: column.sortable ?? false })),
    );
  }, [columns]);
  const paged = rowCount !== undefined && pagination !== undefined;
  const state = useMemo(
    () => ({ pagination: pagination ?? { pageIndex: 0, pageSize: Math.max(1, rows.length) }, sorting: sorting ?? [] }),
    [pagination, sorting, rows.length],
  );
  const table = useTable({
    features,
    columns: defs,
    data: rows,
    rowCount: rowCount ?? rows.length,
    getRowId,
    state,
    ...(onPaginationChange ? { onPaginationChange } : {}),
    ...(onSortingChange ? { onSortingChange } : {}),
    manualPagination: true,
    manualSorting: true,
    sortDescFirst: false,
  });
  return { table, paged };
}
