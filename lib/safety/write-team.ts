import { reportsLetter } from '@/lib/jobs/handlers/reports-letter';
import type { Work } from '@/lib/work/work';
import { answerable, findTeam } from './find-team';

/** How many letters were put in the queue, and how many reports found nobody to write to. */
export interface TeamWritten {
  readonly letters: number;
  readonly unaddressed: number;
}

interface Waiting {
  id: string;
  siteId: string;
}

/**
 * Puts the letters 'a report waits' in the queue, one for each of the team, once for each report however often it is asked.
 * The mark is left without a new version: nothing that a reader has on the screen changes.
 */
export async function writeOfWaiting(work: Work, reportId: string): Promise<TeamWritten> {
  const [report] = await work.sql<Waiting>(
    `select id, site_id as "siteId" from symptom_report where id = ? and state = 'new' and due_at is not null and waiting_letters_at is null for update`,
    [reportId],
  );
  if (!report) return { letters: 0, unaddressed: 0 };
  const team = await findTeam(work, report.siteId);
  if (team.length === 0) return { letters: 0, unaddressed: 1 };
  for (const { accountId } of team) await work.later(reportsLetter, { letter: 'report-waiting', siteId: report.siteId, reportId, accountId });
  await work.sql('update symptom_report set waiting_letters_at = ? where id = ?', [work.now, reportId]);
  return { letters: team.length, unaddressed: 0 };
}

/** Puts the letters 'past its deadline' in the queue for every report in reach that nobody opened in time, once for each. A report that finds nobody is asked for again. */
export async function writeOfOverdue(work: Work): Promise<TeamWritten> {
  const reports = await work.sql<Waiting>(
    `select id, site_id as "siteId" from symptom_report where state = 'new' and due_at < ? and overdue_letters_at is null order by due_at, id for update skip locked`,
    [work.now],
  );
  let [letters, unaddressed] = [0, 0];
  for (const { id, siteId } of reports) {
    const receivers = answerable(await findTeam(work, siteId));
    for (const { accountId } of receivers) await work.later(reportsLetter, { letter: 'report-overdue', siteId, reportId: id, accountId });
    letters += receivers.length;
    if (receivers.length === 0) unaddressed += 1;
    else await work.sql('update symptom_report set overdue_letters_at = ? where id = ?', [work.now, id]);
  }
  return { letters, unaddressed };
}
