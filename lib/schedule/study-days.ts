import { addDays } from '@/instruments/calendar';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** Days after the last window of the schedule in which something can still lie. The data base keeps to the same (visit_in_study). */
const graceDays = 365;

/** The days between which everything of one participant lies, and today, by the clock of the site. */
export interface StudyDays {
  readonly today: string;
  readonly enrolledOn: string;
  readonly lastOn: string;
}

/** @throws Refusal 'not-found' out of reach. */
export async function studyDaysOf(work: Work, participantId: string): Promise<StudyDays> {
  const [found] = await work.sql<{ enrolled_on: string; time_zone: string; closes_on: string }>(
    `select p.enrolled_on::text, s.time_zone, coalesce((select max(v.closes_on) from visit v where v.participant_id = p.id and v.unscheduled_reason is null), p.enrolled_on)::text as closes_on
     from participant p join site s on s.id = p.site_id where p.id = ?`,
    [participantId],
  );
  if (!found) throw new Refusal('not-found', 'There is no such participant in your reach.');
  return { today: localDate(work.now, found.time_zone), enrolledOn: found.enrolled_on, lastOn: addDays(found.closes_on, graceDays) };
}

/** @throws Refusal 'invalid' at `field` for a day before `from` or after the participant's time in the study. */
export function requireDay(on: string, { from, fromWords, lastOn }: { from: string; fromWords: string; lastOn: string }, field: string): void {
  if (on < from) throw new Refusal('invalid', `${on} is before ${fromWords}. Give a day from ${from} on.`, field);
  if (on > lastOn) throw new Refusal('invalid', `${on} is after ${lastOn}, when this participant’s time in the study is over. Check the year.`, field);
}
