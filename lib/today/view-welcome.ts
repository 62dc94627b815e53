import { daysBetween } from '@/instruments/calendar';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** What the public page says of the study: no participant, only how many. */
export interface WelcomeView {
  readonly studyName: string;
  readonly month: { readonly gone: number; readonly of: number };
  readonly sites: readonly { readonly name: string; readonly email: string; readonly count: number; readonly target: number }[];
}

/** The study that is running, with its sites; null before one is set up. */
export async function viewWelcome(work: Work): Promise<WelcomeView | null> {
  const [study] = await work.sql<{ id: string; name: string; starts_on: string; ends_on: string }>('select id, name, starts_on::text, ends_on::text from study order by starts_on desc limit 1');
  if (!study) return null;
  const sites = await work.sql<WelcomeView['sites'][number]>(
    'select name, email, participant_count as count, recruitment_target as target from site where study_id = ? order by participant_count desc, name',
    [study.id],
  );
  const months = (to: string): number => Math.round(daysBetween({ from: study.starts_on, to }) / 30.4375);
  const of = months(study.ends_on);
  return { studyName: study.name, month: { gone: Math.min(of, Math.max(0, months(localDate(work.now, 'UTC')) + 1)), of }, sites };
}
