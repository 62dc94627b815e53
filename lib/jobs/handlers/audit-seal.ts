import { z } from 'zod';
import { sealTrail } from '@/lib/audit/seal-trail';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Seals the audit trail every five minutes; the head is kept in the file store as well, outside the data base. */
export const auditSeal = defineJob({
  name: 'audit.seal',
  payload: z.object({}),
  retry: { limit: 3, delaySeconds: 30, backoff: true },
  cron: '*/5 * * * *',
  run: async (_payload, { storage, log, now }) => {
    const seal = await withWork(await systemEverywhere(), 'job.seal', sealTrail);
    if (!seal) return;
    const head = `${JSON.stringify({ treeSize: seal.treeSize, rootHash: seal.rootHash, sealedAt: now().toISOString() })}\n`;
    await storage.put(`seals/${String(seal.treeSize).padStart(12, '0')}.json`, Buffer.from(head), { contentType: 'application/json' });
    log.info({ job: 'audit.seal', treeSize: seal.treeSize });
  },
});
