import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { groupOf } from './group-of';
import type { QueryWork, TodaySite } from './work-item';

interface Row {
  id: string;
  siteId: string;
  code: string;
  number: string;
  fieldLabel: string;
  question: string | null;
  raisedAt: string;
  dueOn: string;
  visitId: string | null;
  visitName: string | null;
}

/** Open queries: the site is asked. One statement. */
export async function listQueriesWaiting(work: Work, sites: ReadonlyMap<string, TodaySite>): Promise<QueryWork[]> {
  const rows = await work.sql<Row>(
    `select q.id, q.site_id as "siteId", p.code, q.number::text as number, q.field_label as "fieldLabel", q.raised_at::text as "raisedAt", q.due_on::text as "dueOn", q.visit_id as "visitId", v.name as "visitName",
       (select m.text from query_message m where m.query_id = q.id and m.kind in ('question', 'ask again', 'reopen') order by m.at desc limit 1) as question
     from data_query q join participant p on p.id = q.participant_id left join visit v on v.id = q.visit_id
     where q.state = 'open' order by q.due_on, q.number`,
  );
  return rows.flatMap(({ siteId, raisedAt, question, ...row }) => {
    const site = sites.get(siteId);
    if (!site) return [];
    const { today, timeZone, name: siteName } = site;
    return [
      { ...row, kind: 'query' as const, question: question ?? '', raisedOn: localDate(moment(raisedAt), timeZone), today, timeZone, siteName, group: groupOf({ dueOn: row.dueOn, today }) },
    ];
  });
}
