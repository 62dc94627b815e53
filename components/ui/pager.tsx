'use client';

import { Button } from './button';
import { countOf, formatCount } from './format';

export interface PagerProps {
  pageIndex: number;
  pageSize: number;
  rowCount: number;
  onPage: (pageIndex: number) => void;
}

/** Which rows are in sight, out of how many, and the way to the others. */
export function Pager({ pageIndex, pageSize, rowCount, onPage }: PagerProps) {
  if (rowCount === 0) return null;
  const first = pageIndex * pageSize + 1;
  const last = Math.min(rowCount, first + pageSize - 1);
  return (
    <nav className="pager" aria-label="Pages">
      <p role="status">
        {rowCount <= pageSize ? countOf(rowCount, 'row') : `Rows ${formatCount(first)} to ${formatCount(last)} of ${formatCount(rowCount)}`}
      </p>
      {pageIndex > 0 ? (
        <Button kind="link" onClick={() => onPage(pageIndex - 1)}>
          The {pageSize} before
        </Button>
      ) : null}
      {last < rowCount ? (
        <Button kind="link" onClick={() => onPage(pageIndex + 1)}>
          The next {Math.min(pageSize, rowCount - last)}
        </Button>
      ) : null}
    </nav>
  );
}
