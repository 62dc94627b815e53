import { defineWorkKind, type WorkCommon } from '../work-kind';

export interface QueryWork extends WorkCommon {
  readonly kind: 'query';
  readonly number: string;
  readonly fieldLabel: string;
  readonly question: string;
  readonly raisedOn: string;
  readonly visitId: string | null;
  readonly visitName: string | null;
}

type Row = Pick<QueryWork, 'id' | 'number' | 'fieldLabel' | 'question' | 'raisedOn' | 'visitId' | 'visitName'>;

/** Open queries: the site is asked. */
export const queryWork = defineWorkKind<QueryWork, Row>({
  kind: 'query',
  keys: `select q.id, q.site_id, p.code, q.due_on, null::timestamptz as at, q.number as tie, null as standing
    from data_query q join participant p on p.id = q.participant_id where q.state = 'open'`,
  details: `select q.id, q.number::text as number, q.field_label as "fieldLabel", (q.raised_at at time zone s.time_zone)::date::text as "raisedOn", q.visit_id as "visitId", v.name as "visitName",
      coalesce((select m.text from query_message m where m.query_id = q.id and m.kind in ('question', 'ask again', 'reopen') order by m.at desc limit 1), '') as question
    from asked join data_query q on q.id = asked.id join site_day s on s.id = q.site_id left join visit v on v.id = q.visit_id`,
  item: (row, common) => ({ ...common, ...row, kind: 'query' }),
});
