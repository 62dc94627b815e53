import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { ConsentWork, TodaySite } from './work-item';

interface Row {
  id: string;
  siteId: string;
  siteCode: string;
  screeningNumber: number;
  screeningId: string;
  signedAt: string;
  mode: string;
}

/** Consents the participant has signed and nobody has countersigned. They have no deadline, so they stand under today. One statement. */
export async function listConsentsWaiting(work: Work, sites: ReadonlyMap<string, TodaySite>): Promise<ConsentWork[]> {
  const rows = await work.sql<Row>(
    `select c.id, c.site_id as "siteId", s.code as "siteCode", k.number as "screeningNumber", k.id as "screeningId", c.participant_signed_at::text as "signedAt", c.mode
     from consent c join screening k on k.id = c.screening_id join site s on s.id = c.site_id
     where c.state = 'signed by participant' order by c.participant_signed_at, c.id`,
  );
  return rows.flatMap(({ siteId, siteCode, screeningNumber, signedAt, ...row }) => {
    const site = sites.get(siteId);
    if (!site) return [];
    const { today, timeZone, name: siteName } = site;
    const code = `${siteCode}-S${String(screeningNumber).padStart(4, '0')}`;
    return [{ ...row, kind: 'consent' as const, code, signedAt: moment(signedAt).toISOString(), dueOn: localDate(work.now, timeZone), today, timeZone, siteName, group: 'today' as const }];
  });
}
