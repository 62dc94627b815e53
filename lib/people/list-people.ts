import { isInForce } from '@/entities/role-grant';
import { roleNames, type GrantedRole } from '@/lib/auth/roles';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** One role of one account. No health data, no address: people are their codes. */
export interface PersonRole {
  readonly id: string;
  readonly label: string;
  readonly accountState: string;
  readonly role: string;
  readonly where: string;
  readonly startsAt: string;
  readonly endsAt: string | null;
  readonly standing: 'in force' | 'to come' | 'ended';
  /** How many roles the account holds. */
  readonly roles: number;
}

interface Row {
  id: string;
  label: string;
  state: string;
  role: GrantedRole;
  whole_study: boolean;
  site_names: string[] | null;
  starts_at: string;
  ends_at: string | null;
  roles: number;
}

/** Staff roles in the study, by role and label; one statement. Participants' accounts are not listed. */
export async function listPeople(work: Work): Promise<PersonRole[]> {
  const rows = await work.sql<Row>(
    `select g.id, g.label, a.state, g.role, g.whole_study, (select array_agg(s.name order by s.name) from site s where s.id = any (g.site_ids)) as site_names,
       g.starts_at::text, g.ends_at::text, (count(*) over (partition by g.account_id))::int as roles
     from role_grant g join account a on a.id = g.account_id where g.study_id = ? and g.role <> 'participant' order by g.role, g.label, g.starts_at`,
    [work.actor.studyId],
  );
  return rows.map(({ id, label, state, role, whole_study: wholeStudy, site_names: siteNames, starts_at: startsAt, ends_at: endsAt, roles }) => {
    const period = { startsAt: moment(startsAt), endsAt: endsAt === null ? null : moment(endsAt) };
    return {
      id,
      label,
      accountState: state,
      role: roleNames[role],
      where: wholeStudy ? 'Whole study' : (siteNames ?? []).join(', '),
      startsAt: period.startsAt.toISOString(),
      endsAt: period.endsAt?.toISOString() ?? null,
      standing: isInForce(period, work.now) ? 'in force' : period.startsAt > work.now ? 'to come' : 'ended',
      roles,
    };
  });
}
