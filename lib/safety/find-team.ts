import type { Work } from '@/lib/work/work';

/** Somebody of a site's team who is written to about reports. */
export interface TeamMember {
  readonly accountId: string;
  /** The address they sign in with. */
  readonly email: string;
  readonly isInvestigator: boolean;
}

/** The coordinators and site investigators who may act at a site now: one entry a person, however many roles. Needs an act that opens sign-in data. */
export const findTeam = (work: Work, siteId: string): Promise<TeamMember[]> =>
  work.sql<TeamMember>(
    `select c.account_id as "accountId", c.email, bool_or(g.role = 'site-investigator') as "isInvestigator"
     from role_grant g join account a on a.id = g.account_id join credential c on c.account_id = g.account_id join site s on s.id = ?
     where g.role in ('site-coordinator', 'site-investigator') and a.state = 'active' and g.study_id = s.study_id and (g.whole_study or s.id = any (g.site_ids))
       and g.starts_at <= ? and (g.ends_at is null or g.ends_at > ?)
     group by c.account_id, c.email order by c.account_id`,
    [siteId, work.now, work.now],
  );

/** Whom a report past its deadline goes to: the site investigators; the coordinators of a site that has none. */
export function answerable(team: readonly TeamMember[]): readonly TeamMember[] {
  const investigators = team.filter(({ isInvestigator }) => isInvestigator);
  return investigators.length > 0 ? investigators : team;
}
