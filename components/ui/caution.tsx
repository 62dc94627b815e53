import type { ReactNode } from 'react';
import { Buoy } from './signs';

export interface CautionProps {
  /** The warning itself, in bold: 'Hot, red, suddenly swollen arm or fever: seek urgent care.' */
  title?: ReactNode;
  children?: ReactNode;
  /** Between two rules in the page, or the band at the foot of a phone screen. */
  as?: 'rules' | 'band';
}

/** A caution that must be seen: buoy, then words. It is plain text, so a reader meets it in its place. */
export function Caution({ title, children, as = 'rules' }: CautionProps) {
  return (
    <div className={`caution ${as === 'band' ? 'caution-band' : ''}`}>
      <Buoy size={as === 'band' ? 26 : 24} title="Caution" />
      <p>
        {title ? <b>{title} </b> : null}
        {children}
      </p>
    </div>
  );
}

export interface UrgentRowProps {
  /** First line: code, what was said, since when. */
  title: ReactNode;
  /** Second line: what has been done and what must be done, by when. */
  children: ReactNode;
  /** The one button: 'Review the report'. */
  action: ReactNode;
}

/** An urgent report above the work list. It stands there until it is read, whatever its due time. */
export function UrgentRow({ title, children, action }: UrgentRowProps) {
  return (
    <section className="caution caution-urgent" aria-label="Urgent report">
      <Buoy size={30} title="Urgent" />
      <div>
        <p>{title}</p>
        <p className="t-small text-ink-2">{children}</p>
      </div>
      {action}
    </section>
  );
}
