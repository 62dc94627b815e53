import type { ReactNode } from 'react';
import { Brand } from './brand';

export interface PlainShellProps {
  children: ReactNode;
  footer?: ReactNode;
  /** Narrow: one column of fields, as at sign-in. */
  narrow?: boolean;
}

/** Pages before a role is known: sign-in, invitation, refusals. */
export function PlainShell({ children, footer, narrow }: PlainShellProps) {
  return (
    <div className="shell">
      <header className="masthead">
        <Brand href="/" />
      </header>
      <main id="main" tabIndex={-1} className={`page ${narrow ? 'page-narrow' : ''}`}>
        {children}
      </main>
      <footer className="shell-foot">{footer}</footer>
    </div>
  );
}
