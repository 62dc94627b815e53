import { z } from 'zod';
import { keepHeads, readSeals } from '@/lib/audit/keep-heads';
import { sealTrail } from '@/lib/audit/seal-trail';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Seals the audit trail every five minutes; the heads are kept in the file store as well, outside the data base. */
export const auditSeal = defineJob({
  name: 'audit.seal',
  payload: z.object({}),
  retry: { limit: 3, delaySeconds: 30, backoff: true },
  cron: '*/5 * * * *',
  run: async (_payload, { storage, log }) => {
    const actor = await systemEverywhere();
    const seal = await withWork(actor, 'job.seal', sealTrail);
    const heads = await keepHeads(storage, (below) => withWork(actor, 'job.seal', (work) => readSeals(work, { below })));
    if (seal) log.info({ job: 'audit.seal', treeSize: seal.treeSize, heads });
  },
});
