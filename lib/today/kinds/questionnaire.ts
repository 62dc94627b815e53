import { questionnaires } from '@/instruments/questionnaires';
import { defineWorkKind, stillFollowed, type WorkCommon } from '../work-kind';

/** Questionnaires of one participant that are past their day, together; the id is the participant's. */
export interface QuestionWork extends WorkCommon {
  readonly kind: 'questionnaire';
  readonly names: readonly string[];
  readonly opensOn: string;
  readonly closesOn: string;
}

interface Row extends Pick<QuestionWork, 'id' | 'opensOn' | 'closesOn'> {
  readonly instruments: readonly string[];
}

const nameOf = (key: string): string => questionnaires.find((questionnaire) => questionnaire.key === key)?.title ?? key;

const canStillBeSent = `q.state in ('due', 'in progress') and q.due_on < s.today and q.closes_on >= s.today`;

/** Questionnaires past their day that can still be sent, one line a participant. */
export const questionnaireWork = defineWorkKind<QuestionWork, Row>({
  kind: 'questionnaire',
  keys: `select q.participant_id as id, q.site_id, p.code, min(q.due_on) as due_on, null::timestamptz as at, 0 as tie, null as standing
    from site_day s
    cross join lateral (select * from questionnaire_response q where q.site_id = s.id and ${canStillBeSent} offset 0) q
    join participant p on p.id = q.participant_id
    where ${stillFollowed} group by q.participant_id, q.site_id, p.code`,
  details: `select q.participant_id as id, array_agg(q.instrument order by q.instrument) as instruments, min(q.opens_on)::text as "opensOn", max(q.closes_on)::text as "closesOn"
    from asked join questionnaire_response q on q.participant_id = asked.id join site_day s on s.id = q.site_id
    where ${canStillBeSent} group by q.participant_id`,
  item: ({ instruments, ...row }, common) => ({ ...common, ...row, kind: 'questionnaire', names: [...new Set(instruments.map(nameOf))] }),
});
