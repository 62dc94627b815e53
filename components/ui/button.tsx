'use client';

import Link from 'next/link';
import type { ButtonHTMLAttributes, ComponentProps, MouseEvent, ReactNode } from 'react';

export type ButtonKind = 'primary' | 'secondary' | 'risk' | 'link';
export type ButtonSize = 'regular' | 'small' | 'phone';

interface Looks {
  /** One primary on a page; risk for what cannot be undone. Secondary unless said. */
  kind?: ButtonKind;
  size?: ButtonSize;
  /** Takes the whole width, as the phone's main action does. */
  wide?: boolean;
}

export interface ButtonProps extends Looks, Omit<ButtonHTMLAttributes<HTMLButtonElement>, 'disabled'> {
  /** The word shown while the answer is awaited, as 'Saving'. A second press then does nothing. */
  atWork?: string | false | undefined;
  children: ReactNode;
}

function looks({ kind = 'secondary', size = 'regular', wide }: Looks, extra = ''): string {
  if (kind === 'link') return `btn-link ${extra}`.trim();
  const names = ['btn'];
  if (kind !== 'secondary') names.push(`btn-${kind}`);
  if (size !== 'regular') names.push(`btn-${size}`);
  if (wide) names.push('btn-wide');
  return `${names.join(' ')} ${extra}`.trim();
}

/**
 * A verb and what it acts on. Never disabled: pressed too early, the form says
 * what is missing. At work it keeps its width, shows a ring and ignores presses.
 */
export function Button({ kind, size, wide, atWork, children, className, onClick, type = 'button', ...rest }: ButtonProps) {
  const press = (event: MouseEvent<HTMLButtonElement>) => {
    if (atWork) {
      event.preventDefault();
      return;
    }
    onClick?.(event);
  };
  return (
    <button {...rest} type={type} className={looks({ kind, size, wide }, className)} onClick={press} aria-busy={atWork ? true : undefined}>
      {kind === 'link' ? atWork || children : <Face atWork={atWork}>{children}</Face>}
    </button>
  );
}

function Face({ atWork, children }: { atWork: string | false | undefined; children: ReactNode }) {
  return (
    <>
      <span className={atWork ? 'btn-quiet' : undefined} aria-hidden={atWork ? true : undefined}>
        {children}
      </span>
      {atWork ? (
        <span>
          <span className="at-work" aria-hidden="true" />
          {atWork}
        </span>
      ) : null}
    </>
  );
}

export interface ButtonLinkProps extends Looks, ComponentProps<typeof Link> {}

/** A place to go that looks like a button: an anchor, so that it can be opened in a new tab. */
export function ButtonLink({ kind, size, wide, className, children, ...rest }: ButtonLinkProps) {
  return (
    <Link {...rest} className={looks({ kind, size, wide }, className)}>
      {kind === 'link' ? children : <span>{children}</span>}
    </Link>
  );
}
