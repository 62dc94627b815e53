import { IsolationLevel, LockMode } from '@mikro-orm/core';
import { ExtractSchema, failExtract, finishExtract, reportProgress, startExtract } from '@/entities/extract';
import type { Actor } from '@/lib/auth/roles';
import type { Storage } from '@/lib/storage/storage';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';
import { leftOutBy } from './dictionary';
import { csv } from './formats/csv';
import { writeExtract } from './write-extract';

export interface PrepareExtract {
  readonly actor: Actor;
  readonly extractId: string;
  /** A name no other attempt has: each attempt writes a folder of its own. */
  readonly attempt: string;
  readonly storage: Storage;
  readonly now: () => Date;
}

const failure = 'The files could not be written, and none was kept. Try again; if it fails once more, tell the administrator.';

const find = (work: Work, id: string) => work.em.findOneOrFail(ExtractSchema, { id }, { lockMode: LockMode.PESSIMISTIC_WRITE });

/**
 * Prepares one extract: reads the record at one moment, keeps the files, then names them in the ledger, all or none. It may
 * run twice: the files of an attempt that failed or came second are cleared away, so a ready extract has one complete set.
 */
export async function prepareExtract({ actor, extractId, attempt, storage, now }: PrepareExtract): Promise<void> {
  const change = <T>(run: (work: Work) => Promise<T>): Promise<T> => withWork(actor, 'job.extract', run, { now: now() });
  const begun = await change(async (work) => {
    const extract = await find(work, extractId);
    return extract.state === 'ready' ? null : startExtract(extract);
  });
  if (!begun) return;
  const keys: string[] = [];
  const clearAway = async () => {
    for (const key of keys) await storage.remove(key);
  };
  try {
    const asOf = now();
    const written = await withWork(
      actor,
      'job.extract',
      (work) =>
        writeExtract(work, {
          profile: begun.profile,
          format: csv,
          folder: `extracts/${extractId}/${attempt}`,
          storage,
          onKey: (key) => void keys.push(key),
          onProgress: (share) => change(async (own) => reportProgress(await find(own, extractId), share)),
        }),
      { isolation: IsolationLevel.REPEATABLE_READ, now: asOf },
    );
    const isFirst = await change(async (work) =>
      finishExtract(await find(work, extractId), { files: written.files, counts: { ...written.counts }, disclosure: written.disclosure, removed: leftOutBy(begun.profile), asOf, at: work.now }),
    );
    if (!isFirst) await clearAway();
  } catch (error) {
    await clearAway();
    await change(async (work) => failExtract(await find(work, extractId), failure));
    throw error;
  }
}
