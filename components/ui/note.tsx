import type { ReactNode } from 'react';

export type NoteKind = 'open' | 'answered' | 'history' | 'closed' | 'draft';

export interface NoteProps {
  kind: NoteKind;
  /** State, bold: 'Query', 'Answered', 'History', 'Closed', 'Your note'. */
  state: string;
  /** What follows it: ' Q-0431, open'. */
  number?: ReactNode;
  /** Age and who must act, at the right: '14 days, with Northmoor'. */
  aside?: ReactNode;
  /** Past the limit: the right side turns to needs. */
  late?: boolean;
  children?: ReactNode;
  /** Buttons and links under the words. */
  actions?: ReactNode;
}

const lineOf: Record<NoteKind, string> = {
  open: 'var(--note)',
  draft: 'var(--note)',
  answered: 'var(--act)',
  history: 'var(--edge)',
  closed: 'var(--fine)',
};

/** One note of the margin. Its rule takes the colour of its state; the state stands in words beside. */
export function Note({ kind, state, number, aside, late, children, actions }: NoteProps) {
  return (
    <div className={`note note-${kind}`} style={{ '--line': lineOf[kind] } as React.CSSProperties}>
      <p className="note-state">
        <span>
          <b>{state}</b>
          {number}
        </span>
        {aside ? <span className={late ? 'is-needs' : undefined}>{aside}</span> : null}
      </p>
      {children}
      {actions ? <div className="note-actions">{actions}</div> : null}
    </div>
  );
}

/** The monitor's words, in the monitor's hand, with the by-line under them. */
export function MonitorWords({ children, by }: { children: ReactNode; by?: ReactNode }) {
  return (
    <>
      <p className="t-hand">{children}</p>
      {by ? <p className="note-by">{by}</p> : null}
    </>
  );
}

/** The site's answer, in plain ink under a hook. */
export function SiteWords({ children, by }: { children: ReactNode; by?: ReactNode }) {
  return (
    <div className="note-answer">
      <p>{children}</p>
      {by ? <p className="note-by">{by}</p> : null}
    </div>
  );
}

/** A value that was replaced: struck, and announced as earlier. */
export function EarlierValue({ children }: { children: ReactNode }) {
  return (
    <s className="t-num">
      <span className="sr-only">earlier value </span>
      {children}
    </s>
  );
}

export interface PastValue {
  value: ReactNode;
  /** The reason in its own words, or 'first entered'. */
  reason: ReactNode;
  by: ReactNode;
  current?: boolean;
}

/** What a field held, oldest first, each with reason, person and time. */
export function ValueHistory({ values }: { values: readonly PastValue[] }) {
  return (
    <dl className="value-history">
      {values.map(({ value, reason, by, current }, index) => (
        <div key={index} className="contents">
          <dt>{current ? <b className="t-num">{value}</b> : <EarlierValue>{value}</EarlierValue>}</dt>
          <dd>
            {reason}
            <span className="note-by block">{by}</span>
          </dd>
        </div>
      ))}
    </dl>
  );
}
