import type { ReactNode } from 'react';

export interface TableColumn<Row> {
  /** The server's name of the column when it is sorted by. */
  id: string;
  header: string;
  cell: (row: Row) => ReactNode;
  /** Figures: to the right, in the mono. */
  numeric?: boolean;
  sortable?: boolean;
  /** CSS width: '96px', '30%'. */
  width?: string;
  /** The header is read aloud only, as over a column of verbs. */
  headerHidden?: boolean;
}

export interface PlainTableProps<Row> {
  caption: string;
  captionShown?: boolean;
  columns: readonly TableColumn<Row>[];
  rows: readonly Row[];
  getRowId: (row: Row) => string;
  /** Closer rows, for margins and tables behind a chart. */
  tight?: boolean;
}

/** The table's own looks without any script: for server components whose rows are all here. */
export function PlainTable<Row>({ caption, captionShown, columns, rows, getRowId, tight }: PlainTableProps<Row>) {
  return (
    <table role="table" className={`data-table ${tight ? 'data-table-tight' : ''}`}>
      <caption className={captionShown ? 'data-table-caption' : 'sr-only'}>{caption}</caption>
      <thead role="rowgroup">
        <tr role="row">
          {columns.map(({ id, header, numeric, width, headerHidden }) => (
            <th role="columnheader" key={id} scope="col" className={numeric ? 'numeric' : undefined} style={{ width }}>
              {headerHidden ? <span className="sr-only">{header}</span> : header}
            </th>
          ))}
        </tr>
      </thead>
      <tbody role="rowgroup">
        {rows.map((row) => (
          <tr role="row" key={getRowId(row)}>
            {columns.map(({ id, header, numeric, cell }) => (
              <td role="cell" key={id} data-label={header} className={numeric ? 'numeric' : undefined}>
                {cell(row)}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
