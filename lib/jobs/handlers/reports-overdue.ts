import { z } from 'zod';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { writeOfOverdue } from '@/lib/safety/write-team';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Every ten minutes: the shortest deadline is an hour. */
export const reportsOverdue = defineJob({
  name: 'reports.overdue',
  payload: z.object({}),
  retry: { limit: 3, delaySeconds: 60, backoff: true },
  cron: '*/10 * * * *',
  run: async (_payload, { log, now }) => {
    const { letters, unaddressed } = await withWork(await systemEverywhere(), 'job.write-team', writeOfOverdue, { now: now() });
    if (unaddressed > 0) log.error({ job: 'reports.overdue', unaddressed }, 'reports are past their deadline at sites where nobody can be written to');
    if (letters > 0) log.info({ job: 'reports.overdue', letters });
  },
});
