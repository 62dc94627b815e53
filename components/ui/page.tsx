import Link from 'next/link';
import type { ReactNode } from 'react';

export interface Crumb {
  label: string;
  href?: string;
}

export interface PageHeadProps {
  title: ReactNode;
  /** Beside the title in smaller serif: 'Month 9 of 24, left arm below high water'. */
  beside?: ReactNode;
  crumbs?: readonly Crumb[];
  /** A sentence under the title. */
  lede?: ReactNode;
  /** Buttons or tabs at the right. */
  actions?: ReactNode;
}

/** The head of a page: crumbs, the one h1, a sentence, what can be done. */
export function PageHead({ title, beside, crumbs = [], lede, actions }: PageHeadProps) {
  return (
    <header>
      {crumbs.length > 0 ? <Crumbs crumbs={crumbs} /> : null}
      <div className="page-head">
        <div>
          <h1>
            {title}
            {beside ? ' ' : null}
            {beside ? <small className="ml-3.5 font-serif text-[24px] leading-tight text-ink-2">{beside}</small> : null}
          </h1>
          {lede ? <p className="t-lede mt-1.5">{lede}</p> : null}
        </div>
        {actions ? <div className="page-actions">{actions}</div> : null}
      </div>
    </header>
  );
}

function Crumbs({ crumbs }: { crumbs: readonly Crumb[] }) {
  return (
    <nav className="crumb" aria-label="Where this is">
      {crumbs.map(({ label, href }, index) => (
        <span key={label}>
          {index > 0 ? ' / ' : null}
          {href ? <Link href={href}>{label}</Link> : label}
        </span>
      ))}
    </nav>
  );
}

export interface ColumnsProps {
  children: ReactNode;
  /** Sections for the right margin. */
  margin: ReactNode;
  /** Name of the margin for a reader. */
  marginLabel?: string;
  /** The margin's rule in note: it says how things were computed. */
  computed?: boolean;
}

/** Main column and right margin; the margin folds under below 1100 px. */
export function Columns({ children, margin, marginLabel = 'In the margin', computed }: ColumnsProps) {
  return (
    <div className={`columns ${computed ? 'columns-computed' : ''}`}>
      <div className="min-w-0">{children}</div>
      <aside className="margin" aria-label={marginLabel}>
        {margin}
      </aside>
    </div>
  );
}

/** One section of the margin. */
export function MarginPart({ title, children }: { title?: string; children: ReactNode }) {
  return (
    <section>
      {title ? <h3>{title}</h3> : null}
      {children}
    </section>
  );
}

export interface Fact {
  term: string;
  value: ReactNode;
}

/** Facts in a strip between two rules, as under a participant's code. */
export function FactStrip({ facts }: { facts: readonly Fact[] }) {
  return (
    <dl className="facts">
      {facts.map(({ term, value }) => (
        <div key={term}>
          <dt>{term}</dt>
          <dd>{value}</dd>
        </div>
      ))}
    </dl>
  );
}
