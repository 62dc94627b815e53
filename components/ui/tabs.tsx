'use client';

import Link from 'next/link';

export interface Tab {
  key: string;
  label: string;
  count?: number;
  /** Leads to an address; without it the tab is a button and `onChoose` is called. */
  href?: string;
}

export interface TabsProps {
  /** What is narrowed: 'Kind of work'. */
  label: string;
  tabs: readonly Tab[];
  current: string;
  onChoose?: (key: string) => void;
}

/** Words with a foot and a count. They narrow one list and never hide a form. */
export function Tabs({ label, tabs, current, onChoose }: TabsProps) {
  return (
    <nav className="tabs" aria-label={label}>
      {tabs.map(({ key, label: word, count, href }) => {
        const face = count === undefined ? word : `${word} ${count}`;
        return href === undefined ? (
          <button key={key} type="button" className="tab" aria-pressed={key === current} onClick={() => onChoose?.(key)}>
            {face}
          </button>
        ) : (
          <Link key={key} href={href} className="tab" aria-current={key === current ? 'true' : undefined}>
            {face}
          </Link>
        );
      })}
    </nav>
  );
}
