import type { ReactNode } from 'react';

export interface ChartFigureProps {
  /** One sentence of finding: what a reader hears instead of the drawing, and what the eye reads under it. */
  finding: string;
  /** Hide the sentence from the eye where the page already says it. */
  findingHidden?: boolean;
  /** How to read it, under the drawing. */
  reading?: ReactNode;
  /** The same numbers as a table. */
  table: ReactNode;
  /** Least width in pixels before the drawing scrolls inside its frame. */
  least?: number;
  /** What the scrolling frame holds, for a reader: 'Tide chart for NM-0042'. */
  label: string;
  children: ReactNode;
}

/** The frame of every chart: drawing, sentence, and the numbers behind 'Show as a table'. */
export function ChartFigure({ finding, findingHidden, reading, table, least, label, children }: ChartFigureProps) {
  return (
    <figure className="chart">
      <div className="chart-scroll" role="group" aria-label={label} tabIndex={least ? 0 : undefined}>
        <div style={{ minWidth: least }}>{children}</div>
      </div>
      <figcaption className={findingHidden ? 'sr-only' : 'chart-finding'}>{finding}</figcaption>
      {reading ? <p className="t-small text-ink-2">{reading}</p> : null}
      <details className="chart-table">
        <summary>Show as a table</summary>
        {table}
      </details>
    </figure>
  );
}
