import type { ReactNode } from 'react';
import { Neatline } from '../ui/neatline';
import { FindField } from './find-field';
import { FoldingNav } from './folding-nav';
import { Brand } from './brand';

export interface NavItem {
  href: string;
  label: string;
  current?: boolean;
  /** How many wait on this person; 0 and none print nothing. */
  count?: number;
}

export interface StaffShellProps {
  /** Where the mark leads: Today. */
  homeHref: string;
  study: string;
  /** The site, or a control that changes it; 'All sites'. */
  site: ReactNode;
  nav: readonly NavItem[];
  /** Address that the find field asks, with `?q=`; none hides the field. */
  findHref?: string;
  /** 'Site coordinator'. */
  role: string;
  /** 'C-03'. */
  code: string;
  /** Beside role and code: a control that switches role, signs out. */
  account?: ReactNode;
  /** Months in the study and how many are gone, as 22 of 48. */
  studyMonth: { gone: number; of: number };
  /** Sentences of the footer; the last stands at the right and names the zone. */
  footer: readonly ReactNode[];
  children: ReactNode;
}

/** Every staff page: masthead, the study's time, the page, the footer. */
export function StaffShell({ homeHref, study, site, nav, findHref, role, code, account, studyMonth, footer, children }: StaffShellProps) {
  return (
    <div className="shell">
      <header className="masthead">
        <Brand href={homeHref} />
        <div className="masthead-where">
          <b>{study}</b>
          <span>{site}</span>
        </div>
        <FoldingNav nav={nav} />
        <div className="masthead-end">
          {findHref ? <FindField action={findHref} /> : null}
          <div className="masthead-me">
            {role}
            <span>{code}</span>
          </div>
          {account}
        </div>
      </header>
      <Neatline segments={studyMonth.of} gone={studyMonth.of > 0 ? studyMonth.gone / studyMonth.of : 0} />
      <main id="main" tabIndex={-1} className="page">
        {children}
      </main>
      <footer className="shell-foot">
        <span>
          Study month {studyMonth.gone} of {studyMonth.of}
        </span>
        {footer.map((sentence, index) => (
          <span key={index}>{sentence}</span>
        ))}
      </footer>
    </div>
  );
}
