import { randomUUID } from 'node:crypto';
import { z } from 'zod';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { prepareExtract } from '@/lib/extracts/prepare-extract';
import { defineJob } from '../define-job';

/** Fills an extract with its files. A second run finds it ready and does nothing. */
export const extractPrepare = defineJob({
  name: 'extract.prepare',
  payload: z.strictObject({ extractId: z.uuid() }),
  retry: { limit: 2, delaySeconds: 30, backoff: true },
  run: async ({ extractId }, { storage, now }) => prepareExtract({ actor: await systemEverywhere(), extractId, attempt: randomUUID(), storage, now }),
});
