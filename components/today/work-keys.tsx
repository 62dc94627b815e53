'use client';

import { useEffect, useRef, type ReactNode } from 'react';

const isTyping = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && (target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName));

/** Keys of the work list: j to the next row's verb, k to the one before; Enter then opens it, as on any link. */
export function WorkKeys({ children }: { children: ReactNode }) {
  const frame = useRef<HTMLDivElement>(null);
  useEffect(() => {
    const move = (event: KeyboardEvent) => {
      if ((event.key !== 'j' && event.key !== 'k') || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return;
      const verbs = [...(frame.current?.querySelectorAll<HTMLElement>('.work-do a') ?? [])];
      const at = verbs.findIndex((verb) => verb.closest('.work-row')?.contains(document.activeElement));
      const next = event.key === 'j' ? at + 1 : at - 1;
      const verb = verbs[Math.min(verbs.length - 1, Math.max(0, next))];
      if (!verb) return;
      event.preventDefault();
      verb.focus();
      verb.scrollIntoView({ block: 'nearest' });
    };
    document.addEventListener('keydown', move);
    return () => document.removeEventListener('keydown', move);
  }, []);
  return <div ref={frame}>{children}</div>;
}
