import { addDays } from '@/instruments/calendar';
import { currentConsentForm } from '@/lib/protocol/find-protocol';
import type { Work } from '@/lib/work/work';
import type { TodaySite } from './site-day';

/** Recruitment at the sites in reach. */
export interface RecruitmentView {
  readonly from: string;
  readonly to: string;
  readonly today: string;
  readonly target: number;
  readonly count: number;
  readonly enrolled: readonly { readonly on: string; readonly count: number }[];
  /** People a day over the last 91 days. */
  readonly pacePerDay: number;
}

/** How many of those in the study stand on the consent form in force. */
export interface ConsentStanding {
  readonly number: string;
  readonly current: number;
  readonly of: number;
}

interface Row {
  starts_on: string;
  ends_on: string;
  months: { on: string; count: number }[] | null;
  recent: number;
  current: number;
  taking_part: number;
}

/** Recruitment and consent: one statement, after the one that finds the form in force. */
export async function viewRecruitment(work: Work, { sites, today }: { sites: readonly TodaySite[]; today: string }): Promise<{ recruitment: RecruitmentView; consent: ConsentStanding }> {
  const form = await currentConsentForm(work);
  const [row] = await work.sql<Row>(
    `select st.starts_on::text, st.ends_on::text,
       (select jsonb_agg(jsonb_build_object('on', m.month, 'count', m.count) order by m.month) from (select date_trunc('month', p.enrolled_on)::date as month, count(*)::int as count from participant p group by 1) m) as months,
       (select count(*)::int from participant p where p.enrolled_on > ?::date - 91 and p.enrolled_on <= ?::date) as recent,
       (select count(distinct c.participant_id)::int from consent c join participant p on p.id = c.participant_id where p.state = 'enrolled' and c.state = 'complete' and c.form_version_id = ?) as current,
       (select count(*)::int from participant p where p.state = 'enrolled') as taking_part
     from study st where st.id = ?`,
    [today, today, form.id, work.actor.studyId],
  );
  if (!row) throw new Error('The study of a signed-in person exists.');
  let count = 0;
  const steps = (row.months ?? []).map((month) => {
    count += month.count;
    // A month's count is reached by its end; the running month's by today.
    const end = addDays(month.on, 30);
    return { on: end < today ? end : today, count };
  });
  return {
    recruitment: {
      from: row.starts_on,
      to: row.ends_on,
      today,
      target: sites.reduce((sum, { recruitmentTarget }) => sum + recruitmentTarget, 0),
      count,
      enrolled: [{ on: row.starts_on, count: 0 }, ...steps],
      pacePerDay: row.recent / 91,
    },
    consent: { number: form.number, current: row.current, of: row.taking_part },
  };
}
