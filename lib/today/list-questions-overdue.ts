import { questionnaires } from '@/instruments/questionnaires';
import type { Work } from '@/lib/work/work';
import { groupOf } from './group-of';
import type { QuestionWork, TodaySite } from './work-item';

interface Row {
  siteId: string;
  code: string;
  instruments: string[];
  opensOn: string;
  dueOn: string;
  closesOn: string;
}

const nameOf = (key: string): string => questionnaires.find((questionnaire) => questionnaire.key === key)?.title ?? key;

/** Questionnaires past their day that can still be sent, one line a participant. One statement. */
export async function listQuestionsOverdue(work: Work, sites: ReadonlyMap<string, TodaySite>): Promise<QuestionWork[]> {
  const rows = await work.sql<Row>(
    `select q.site_id as "siteId", p.code, array_agg(q.instrument order by q.instrument) as instruments,
       min(q.opens_on)::text as "opensOn", min(q.due_on)::text as "dueOn", max(q.closes_on)::text as "closesOn"
     from questionnaire_response q join participant p on p.id = q.participant_id join site s on s.id = q.site_id
     where q.state in ('due', 'in progress') and q.due_on < (?::timestamptz at time zone s.time_zone)::date and q.closes_on >= (?::timestamptz at time zone s.time_zone)::date and (p.state = 'enrolled' or p.left_grade = 'stops training')
     group by q.site_id, p.code order by min(q.due_on), p.code`,
    [work.now, work.now],
  );
  return rows.flatMap(({ siteId, instruments, ...row }) => {
    const site = sites.get(siteId);
    if (!site) return [];
    const { today, timeZone, name: siteName } = site;
    return [{ ...row, id: row.code, kind: 'questionnaire' as const, names: [...new Set(instruments.map(nameOf))], today, timeZone, siteName, group: groupOf({ dueOn: row.dueOn, today }) }];
  });
}
