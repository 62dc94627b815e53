import { z } from 'zod';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { markMissed } from '@/lib/questionnaires/mark-missed';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Every hour, because the sites' days end at different hours. */
export const questionnairesMissed = defineJob({
  name: 'questionnaires.missed',
  payload: z.object({}),
  retry: { limit: 3, delaySeconds: 60, backoff: true },
  cron: '5 * * * *',
  run: async (_payload, { log, now }) => {
    const { missed } = await withWork(await systemEverywhere(), 'job.mark-missed', markMissed, { now: now() });
    log.info({ job: 'questionnaires.missed', missed });
  },
});
