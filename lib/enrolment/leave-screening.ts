import { leaveNotEnrolled } from '@/entities/screening';
import type { Work } from '@/lib/work/work';
import { findScreening } from './find-screening';

/** Ends a screening without enrolment. The reason counts in the participant flow. */
export async function leaveScreening(work: Work, { id, notEnrolledReason, note }: { id: string; notEnrolledReason: string; note?: string | null | undefined }): Promise<{ version: number }> {
  const screening = await findScreening(work, id);
  work.expect(screening);
  leaveNotEnrolled(screening, notEnrolledReason, note ?? null);
  await work.em.flush();
  // A link that is still out then finds nothing to sign.
  await work.sql(`update consent set state = 'set aside', version = version + 1 where screening_id = ? and state in ('reading', 'signed by participant')`, [id]);
  return { version: screening.version };
}
