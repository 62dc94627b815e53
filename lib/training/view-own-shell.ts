import { daysBetween } from '@/instruments/calendar';
import { findOwnRecord } from '@/lib/people/find-own-record';
import type { Work } from '@/lib/work/work';

/** What every participant page says: the code, the site, how much of two years is gone, what waits. */
export interface OwnShellView {
  readonly code: string;
  readonly site: { readonly name: string; readonly phone: string; readonly timeZone: string };
  /** The participant's own two years, 0 to 1. */
  readonly gone: number;
  readonly questionsDue: number;
  readonly today: string;
}

const twoYearsDays = 730;

export async function viewOwnShell(work: Work): Promise<OwnShellView> {
  const { participant, site, today } = await findOwnRecord(work);
  const [row] = await work.sql<{ due: number }>(
    `select count(*)::int as due from questionnaire_response where participant_id = ? and state in ('due', 'in progress') and ?::date between opens_on and closes_on`,
    [participant.id, today],
  );
  const gone = daysBetween({ from: participant.enrolledOn, to: today }) / twoYearsDays;
  return { code: participant.code, site, gone: Math.min(1, Math.max(0, gone)), questionsDue: row?.due ?? 0, today };
}
