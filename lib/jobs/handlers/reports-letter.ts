import { z } from 'zod';
import { systemActor } from '@/lib/auth/roles';
import { letterNamed } from '@/lib/mail';
import { addressLetter } from '@/lib/safety/address-letter';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Sends one letter about a report to one person of the team; the address is looked up when it goes out, and none goes once the report has been opened. */
export const reportsLetter = defineJob({
  name: 'reports.letter',
  payload: z.strictObject({ letter: z.enum(['report-waiting', 'report-overdue']), siteId: z.uuid(), reportId: z.uuid(), accountId: z.uuid() }),
  retry: { limit: 7, delaySeconds: 60, backoff: true },
  async run({ letter, ...about }, { sendLetter, jobId, now }) {
    const posting = await withWork(systemActor([about.siteId]), 'job.write-team', (work) => addressLetter(work, about), { now: now() });
    if (posting) await sendLetter(letterNamed(letter), { ...posting, id: jobId });
  },
});
