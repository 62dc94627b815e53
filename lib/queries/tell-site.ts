import type { DataQuery } from '@/entities/data-query';
import { env } from '@/lib/env';
import { mailSend } from '@/lib/jobs/handlers/mail-send';
import type { Work } from '@/lib/work/work';

/** A letter to the site's own address: code, visit and link; never the value or the question. */
export async function tellSite(work: Work, query: DataQuery): Promise<void> {
  const [where] = await work.sql<{ email: string; code: string; visit: string | null }>(
    'select s.email, p.code, v.name as visit from site s join participant p on p.site_id = s.id left join visit v on v.id = ? where p.id = ?',
    [query.visitId, query.participantId],
  );
  if (!where) return;
  const page = query.visitId ? `/participants/${where.code}/visits/${query.visitId}` : `/participants/${where.code}`;
  const data = { participantCode: where.code, visitName: where.visit ?? 'the record', url: `${env().NEXTAUTH_URL}${page}#query-${query.id}`, raisedBy: query.origin === 'check' ? 'An edit check' : 'A monitor' };
  await work.later(mailSend, { letter: 'query-raised', to: where.email, data });
}
