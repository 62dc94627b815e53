import { z } from 'zod';
import { systemActor } from '@/lib/auth/roles';
import { writeOfWaiting } from '@/lib/safety/write-team';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Asked for with the report itself. The participant who sends it cannot see who works at the site, so the team is found here. */
export const reportsWaiting = defineJob({
  name: 'reports.waiting',
  payload: z.strictObject({ siteId: z.uuid(), reportId: z.uuid() }),
  retry: { limit: 7, delaySeconds: 10, backoff: true },
  async run({ siteId, reportId }, { log, now }) {
    const { letters, unaddressed } = await withWork(systemActor([siteId]), 'job.write-team', (work) => writeOfWaiting(work, reportId), { now: now() });
    if (unaddressed > 0) log.error({ job: 'reports.waiting', siteId }, 'a report waits at a site where nobody can be written to');
    else log.info({ job: 'reports.waiting', letters });
  },
});
