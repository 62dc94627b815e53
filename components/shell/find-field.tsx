'use client';

import { useEffect, useRef } from 'react';
import { Verb } from '../ui/verbs';

/** Finds a participant, form or query. The key `/` leads here unless something is being typed. */
export function FindField({ action }: { action: string }) {
  const box = useRef<HTMLInputElement>(null);
  useEffect(() => {
    const find = (event: KeyboardEvent) => {
      if (event.key !== '/' || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return;
      event.preventDefault();
      box.current?.focus();
    };
    document.addEventListener('keydown', find);
    return () => document.removeEventListener('keydown', find);
  }, []);
  return (
    <form role="search" action={action} className="find">
      <Verb name="find" size={15} />
      <input
        ref={box}
        type="search"
        name="q"
        autoComplete="off"
        aria-label="Find a participant, form or query"
        placeholder="Participant, form or query"
      />
      <kbd aria-hidden="true">/</kbd>
    </form>
  );
}

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && (target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName));
}
