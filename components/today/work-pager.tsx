'use client';

import { useRouter } from 'next/navigation';
import type { ViewTodayInput } from '@/lib/today/input';
import { Pager, type PagerProps } from '../ui/pager';
import { addressOfToday } from './today-address';

/** The pages of one group; each has an address. */
export function WorkPager({ kind, group, ...pages }: Omit<PagerProps, 'onPage'> & Pick<ViewTodayInput, 'kind' | 'group'>) {
  const router = useRouter();
  return <Pager {...pages} onPage={(page) => router.push(addressOfToday({ kind, group, page }))} />;
}
