import { useSyncExternalStore } from 'react';
import { anchorOf, keyOfTarget, type ReviewItem } from './review-items';

/** Puts the focus on a value: its own button, or that of its line. */
export function focusValue(key: string): void {
  const value = document.getElementById(anchorOf(key));
  const button = value?.matches('button') ? value : value?.closest('.sheet-row')?.querySelector<HTMLElement>('.choose-row');
  button?.focus();
}

/** The value that a fragment leads to: '#at-…' names it, '#query-…' a note on it; null for any other. */
export function keyAtFragment(fragment: string, items: readonly ReviewItem[], queries: readonly { readonly id: string; readonly target: Parameters<typeof keyOfTarget>[0] }[]): string | null {
  const id = fragment.replace(/^#/, '');
  if (id === '') return null;
  const query = queries.find((one) => id === `query-${one.id}`);
  const key = query ? keyOfTarget(query.target) : null;
  return items.find((item) => item.key === key || anchorOf(item.key) === id)?.key ?? null;
}

const listen = (changed: () => void) => {
  window.addEventListener('hashchange', changed);
  return () => window.removeEventListener('hashchange', changed);
};

/** The fragment of the address, '' on the server. */
export const useFragment = (): string => useSyncExternalStore(listen, () => window.location.hash, () => '');
