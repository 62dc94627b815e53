import { tokenHash } from './token';
import { secondsAfter } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** How often something may be tried. The bucket is hashed: no address stands in the table. */
export interface Throttle {
  readonly bucket: string;
  readonly most: number;
  readonly withinSeconds: number;
}

/** Counts a try. Returns false when there were too many; the caller then refuses, in its own words. */
export async function mayTry(work: Work, { bucket, most, withinSeconds }: Throttle): Promise<boolean> {
  const key = tokenHash(bucket);
  const since = secondsAfter(work.now, -withinSeconds);
  await work.sql('delete from rate_hit where bucket = ? and at < ?', [key, since]);
  const [count] = await work.sql<{ tries: number }>('select count(*)::int as tries from rate_hit where bucket = ?', [key]);
  if ((count?.tries ?? 0) >= most) return false;
  await work.sql('insert into rate_hit (bucket, at) values (?, ?)', [key, work.now]);
  return true;
}
