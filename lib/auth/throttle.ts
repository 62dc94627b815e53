import { tokenHash } from './token';
import { secondsAfter } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** How often something may be tried. The bucket is hashed: no address stands in the table. */
export interface Throttle {
  readonly bucket: string;
  readonly most: number;
  readonly withinSeconds: number;
}

/**
 * Counts a try. Returns false when there were too many; the caller then refuses, in its own words. Tries at one moment
 * wait for each other until the transaction ends, so that none slips past the count: keep that transaction short, and
 * check the secret in the next one.
 */
export async function mayTry(work: Work, { bucket, most, withinSeconds }: Throttle): Promise<boolean> {
  const key = tokenHash(bucket);
  const since = secondsAfter(work.now, -withinSeconds);
  await work.sql('select pg_advisory_xact_lock(hashtextextended(?, 0))', [key]);
  await work.sql('delete from rate_hit where bucket = ? and at < ?', [key, since]);
  const [count] = await work.sql<{ tries: number }>('select count(*)::int as tries from rate_hit where bucket = ?', [key]);
  if ((count?.tries ?? 0) >= most) return false;
  await work.sql('insert into rate_hit (bucket, at) values (?, ?)', [key, work.now]);
  return true;
}

/** Forgets the tries of a bucket: the secret was right. */
export async function clearTries(work: Work, bucket: string): Promise<void> {
  await work.sql('delete from rate_hit where bucket = ?', [tokenHash(bucket)]);
}

/** Takes one try back, where right ones do not count but wrong ones of others stay. */
export async function takeBackTry(work: Work, bucket: string): Promise<void> {
  await work.sql('delete from rate_hit where ctid = (select ctid from rate_hit where bucket = ? order by at desc limit 1)', [tokenHash(bucket)]);
}
