import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findConsent } from './find-consent';

/** What was read so far. */
export interface ReadingView {
  readonly sectionsRead: readonly string[];
  readonly version: number;
}

/** Marks one part of the form as read; twice is once. @throws Refusal 'conflict' when it is signed already. */
export async function markPartRead(work: Work, { id, part }: { id: string; part: string }): Promise<ReadingView> {
  const { consent, form } = await findConsent(work, id);
  if (!form.form.sections.some(({ key }) => key === part)) throw new Refusal('not-found', 'The form has no such part.');
  if (consent.state !== 'reading') throw new Refusal('conflict', 'This consent is already signed.');
  // One statement, so that two pages open on one consent add to each other instead of overwriting.
  await work.sql('update consent set sections_read = array_append(sections_read, ?), version = version + 1 where id = ? and not (? = any (sections_read))', [part, id, part]);
  await work.em.refresh(consent);
  return { sectionsRead: consent.sectionsRead, version: consent.version };
}
