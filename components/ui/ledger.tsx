import type { ReactNode } from 'react';
import { Dash, DoneTick, Notch } from './signs';

export interface LedgerStep {
  key: string;
  state: 'done' | 'now' | 'to-come';
  title: ReactNode;
  /** When, at the right of the title. */
  when?: ReactNode;
  /** Who and what, under the title. */
  children?: ReactNode;
}

const signs = { done: <DoneTick title="done" />, now: <Notch now size={14} title="now" />, 'to-come': <Dash title="to come" /> };

/** Steps of one thing down a line: done, now, to come. */
export function Ledger({ steps, label }: { steps: readonly LedgerStep[]; label: string }) {
  return (
    <ol className="ledger" aria-label={label}>
      {steps.map(({ key, state, title, when, children }) => (
        <li key={key} className={`ledger-${state}`} aria-current={state === 'now' ? 'step' : undefined}>
          <span className="ledger-sign">{signs[state]}</span>
          <div>
            <p className="ledger-title">
              <b>{title}</b>
              {when ? <span>{when}</span> : null}
            </p>
            {children ? <div className="text-ink-2">{children}</div> : null}
          </div>
        </li>
      ))}
    </ol>
  );
}

export interface Version {
  key: string;
  title: ReactNode;
  when?: ReactNode;
  draft?: boolean;
  children?: ReactNode;
}

/** Versions of one thing, newest first, a draft dashed. Changes inside are marked with `<del>` and `<ins>`. */
export function Versions({ versions, label }: { versions: readonly Version[]; label: string }) {
  return (
    <ol className="versions" aria-label={label}>
      {versions.map(({ key, title, when, draft, children }) => (
        <li key={key} className={draft ? 'versions-draft' : undefined}>
          <p className="ledger-title">
            <b>{title}</b>
            {when ? <span>{when}</span> : null}
          </p>
          {children ? <div className="text-ink-2">{children}</div> : null}
        </li>
      ))}
    </ol>
  );
}
