import { useEffect } from 'react';

/** What a single key asks for on the review form. */
export type ReviewKey = 'next' | 'before' | 'seen' | 'write' | 'history' | 'correct' | 'next form';

const keys: Readonly<Record<string, ReviewKey>> = { j: 'next', k: 'before', v: 'seen', m: 'write', h: 'history', c: 'correct', ']': 'next form' };

/** The meaning of a key press; null while something is being typed, a dialog is open, or a modifier is held. */
export function reviewKeyOf(press: { key: string; ctrlKey: boolean; metaKey: boolean; altKey: boolean }, isTyping: boolean): ReviewKey | null {
  if (isTyping || press.ctrlKey || press.metaKey || press.altKey) return null;
  return keys[press.key] ?? null;
}

const isTypingIn = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && (target.isContentEditable || target.closest('input, textarea, select, dialog[open]') !== null);

/** Listens for the review's single keys while `on`. Every one of them has a button too. */
export function useReviewKeys(on: boolean, act: (key: ReviewKey) => void): void {
  useEffect(() => {
    if (!on) return;
    const listen = (event: KeyboardEvent) => {
      const key = reviewKeyOf(event, isTypingIn(event.target) || document.querySelector('dialog[open]') !== null);
      if (key === null) return;
      event.preventDefault();
      act(key);
    };
    document.addEventListener('keydown', listen);
    return () => document.removeEventListener('keydown', listen);
  }, [on, act]);
}
