import { addDays, addWorkingDays } from '@/instruments/calendar';
import type { SiteDeadline } from '@/instruments/safety/judge-symptom-report';
import { localDate, momentAt, secondsAfter } from '@/lib/work/time';

/** A site's day ends here. Common practice, no source. */
const closingTime = '17:00';

/** By when the site must have acted: so many hours after the report, or the close of a day at the site. */
export function dueAt(deadline: SiteDeadline | null, from: Date, timeZone: string): Date | null {
  if (deadline === null) return null;
  if ('hours' in deadline) return secondsAfter(from, deadline.hours * 3600);
  const on = localDate(from, timeZone);
  return momentAt('workingDays' in deadline ? addWorkingDays(on, deadline.workingDays) : addDays(on, deadline.days), closingTime, timeZone);
}
