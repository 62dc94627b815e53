'use client';

import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import type { ExtractView } from '@/lib/extracts/view-extract';
import { send } from '../api/send';
import { useSend } from '../api/use-send';
import { Button } from '../ui/button';
import { Gauge } from '../ui/gauge';
import { standing } from './words';

const askEveryMs = 2000;

/** Where the work stands, asked for until it ends; then the page is read again with its files. */
export function ExtractProgress({ first, mayRetry }: { first: ExtractView; mayRetry: boolean }) {
  const router = useRouter();
  const isOver = ({ state }: ExtractView) => state === 'ready' || state === 'failed';
  const { data = first } = useQuery({
    queryKey: ['extract', first.id, first.version],
    queryFn: () => send<ExtractView>('GET', `/api/extracts/${first.id}`),
    initialData: first,
    refetchInterval: ({ state: { data: latest } }) => (latest && isOver(latest) ? false : askEveryMs),
  });
  const retry = useSend<ExtractView>('POST', `/api/extracts/${first.id}/retry`, { version: data.version });
  const hasChanged = data.state !== first.state && isOver(data);
  useEffect(() => {
    if (hasChanged) router.refresh();
  }, [hasChanged, router]);
  return (
    <div role="status">
      <Gauge {...standing(data)} size={120} />
      {data.state === 'failed' ? (
        <>
          <p className="mt-2">{data.failure}</p>
          {mayRetry ? (
            <p className="mt-3">
              <Button atWork={retry.isPending && 'Asking'} onClick={() => retry.mutate({}, { onSuccess: () => router.refresh() })}>
                Try again
              </Button>
            </p>
          ) : null}
          {retry.error ? <p className="is-needs mt-2">{retry.error.problem.detail}</p> : null}
        </>
      ) : null}
      {isOver(data) ? null : <p className="t-small mt-1.5 text-ink-2">You can leave this page; the files stay here.</p>}
    </div>
  );
}
