import { SiteSchema } from '@/entities/site';
import { SymptomReportSchema } from '@/entities/symptom-report';
import { env } from '@/lib/env';
import { plainMoment } from '@/lib/people/plain-date';
import type { Work } from '@/lib/work/work';
import { findTeam } from './find-team';

/**
 * Where a letter about a report goes and what it says, as things stand when it goes out.
 * @returns null when there is nothing to send any more: the report has been opened, or the person's role has ended.
 */
export async function addressLetter(work: Work, { siteId, reportId, accountId }: { siteId: string; reportId: string; accountId: string }) {
  const report = await work.em.findOneOrFail(SymptomReportSchema, { id: reportId, siteId });
  const member = (await findTeam(work, siteId)).find((candidate) => candidate.accountId === accountId);
  if (report.state !== 'new' || !report.dueAt || !member) return null;
  const site = await work.em.findOneOrFail(SiteSchema, { id: siteId });
  return { to: member.email, data: { siteName: site.name, dueBy: plainMoment(report.dueAt, site.timeZone), url: `${env().NEXTAUTH_URL}/safety` } };
}
