import { systemActor } from '@/lib/auth/roles';
import { env } from '@/lib/env';
import { log } from '@/lib/log';
import { moment } from '@/lib/work/time';
import { withWork } from '@/lib/work/with-work';

/** The worker is taken for gone after this long without a heartbeat. */
const heartbeatSeconds = 90;

export interface Health {
  readonly live: true;
  readonly ready: boolean;
  readonly version: string;
  readonly database: 'reachable' | 'not reachable';
  readonly worker: 'working' | 'not seen';
}

/** Live as soon as it answers; ready with the data base and a worker. */
export async function checkHealth(): Promise<Health> {
  const version = env().APP_VERSION;
  try {
    return await withWork(systemActor(), 'session.check', async (work) => {
      const [row] = await work.sql<{ seen_at: string | null }>('select max(seen_at) as seen_at from worker_heartbeat');
      const working = row?.seen_at != null && work.now.getTime() - moment(row.seen_at).getTime() < heartbeatSeconds * 1000;
      return { live: true, ready: working, version, database: 'reachable', worker: working ? 'working' : 'not seen' };
    });
  } catch (error) {
    log().error({ at: 'health', code: (error as { code?: unknown }).code ?? 'fault' });
    return { live: true, ready: false, version, database: 'not reachable', worker: 'not seen' };
  }
}
