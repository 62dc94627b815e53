'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { useEffect, useId, useRef, useState } from 'react';
import { Verb } from '../ui/verbs';
import type { NavItem } from './staff-shell';

/** The words of the masthead. On a narrow screen they fold behind one button that says where you are. */
export function FoldingNav({ nav }: { nav: readonly NavItem[] }) {
  const [open, setOpen] = useState(false);
  const menuId = useId();
  const key = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    if (!open) return;
    const close = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return;
      setOpen(false);
      key.current?.focus();
    };
    document.addEventListener('keydown', close);
    return () => document.removeEventListener('keydown', close);
  }, [open]);
  const here = usePathname();
  const waiting = nav.reduce((sum, item) => sum + (item.count ?? 0), 0);
  return (
    <>
      <button ref={key} type="button" className="masthead-menu" aria-expanded={open} aria-controls={menuId} onClick={() => setOpen(!open)}>
        <Verb name={open ? 'dismiss' : 'menu'} size={20} />
        Menu
        {waiting > 0 ? (
          <i>
            {waiting}
            <span className="sr-only"> waiting on you</span>
          </i>
        ) : null}
      </button>
      <nav id={menuId} className={`masthead-nav ${open ? 'masthead-nav-open' : ''}`} aria-label="Main">
        {nav.map(({ href, label, current, count }) => (
          <Link
            key={href}
            href={href}
            aria-current={(current ?? (here === href || here.startsWith(`${href}/`))) ? 'page' : undefined}
            onClick={() => setOpen(false)}
          >
            {label}
            {count ? (
              <i>
                {count}
                <span className="sr-only"> waiting on you</span>
              </i>
            ) : null}
          </Link>
        ))}
      </nav>
    </>
  );
}
