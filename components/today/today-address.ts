import type { ViewTodayInput } from '@/lib/today/input';

/** The address of Today narrowed to a kind, to one group of it, to a page of the group. What is left out is not narrowed. */
export function addressOfToday({ kind = 'all', group, page = 0 }: Partial<ViewTodayInput>): string {
  const narrowed = new URLSearchParams({ ...(kind === 'all' ? {} : { kind }), ...(group ? { group } : {}), ...(page > 0 ? { page: String(page) } : {}) });
  return narrowed.size === 0 ? '/today' : `/today?${narrowed}`;
}
