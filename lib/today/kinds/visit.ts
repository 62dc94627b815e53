import { moment } from '@/lib/work/time';
import { defineWorkKind, stillFollowed, type WorkCommon } from '../work-kind';

export interface VisitWork extends WorkCommon {
  readonly kind: 'visit';
  readonly name: string;
  readonly opensOn: string;
  readonly targetOn: string;
  readonly closesOn: string;
  readonly bookedAt: string | null;
  readonly bookedOn: string | null;
  readonly state: 'to come' | 'in progress';
  readonly formsDone: number;
  readonly formsOf: number;
}

type Row = Pick<VisitWork, 'id' | 'name' | 'opensOn' | 'targetOn' | 'closesOn' | 'bookedAt' | 'bookedOn' | 'state' | 'formsDone' | 'formsOf'>;

/**
 * Visits that have not ended and ask for something up to the last day shown. A visit asks on its appointment, else on
 * its target while that is to come, else on the last day of its window; an appointment that passed without the visit
 * having begun is asked about on the day itself.
 */
export const visitWork = defineWorkKind<VisitWork, Row>({
  kind: 'visit',
  keys: `select v.id, v.site_id, p.code, due.due_on, v.booked_at as at, v.closes_on - date '2000-01-01' as tie, null as standing
    from site_day s
    cross join lateral (select * from visit v where v.site_id = s.id and v.state in ('to come', 'in progress') and (v.target_on <= s.last_on or v.booked_at is not null or v.state = 'in progress') offset 0) v
    join participant p on p.id = v.participant_id
    cross join lateral (select (v.booked_at at time zone s.time_zone)::date as booked_on) booked
    cross join lateral (select case
        when v.state = 'in progress' then s.today
        when booked_on >= s.today then booked_on
        when v.closes_on < s.today then v.closes_on
        when booked_on is not null then s.today
        when v.target_on >= s.today then v.target_on
        else v.closes_on
      end as due_on) due
    where ${stillFollowed} and due.due_on <= s.last_on`,
  details: `select v.id, v.name, v.opens_on::text as "opensOn", v.target_on::text as "targetOn", v.closes_on::text as "closesOn",
      v.booked_at::text as "bookedAt", (v.booked_at at time zone s.time_zone)::date::text as "bookedOn", v.state,
      (select count(*)::int from limb_assessment a where a.visit_id = v.id and a.state = 'complete') + (select count(*)::int from questionnaire_response q where q.visit_id = v.id and q.state = 'submitted') as "formsDone",
      1 + (select count(*)::int from questionnaire_response q where q.visit_id = v.id) as "formsOf"
    from asked join visit v on v.id = asked.id join site_day s on s.id = v.site_id`,
  item: ({ bookedAt, ...row }, common) => ({ ...common, ...row, kind: 'visit', bookedAt: bookedAt === null ? null : moment(bookedAt).toISOString() }),
});
