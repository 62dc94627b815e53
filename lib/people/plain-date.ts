import { weekday } from '@/instruments/calendar';
import { localClock, localDate } from '@/lib/work/time';

const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const weekdays = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];

/** '3 Mar 2027', for a sentence to a person. */
export function plainDate(on: string): string {
  const [year, month, day] = on.split('-').map(Number);
  return `${day} ${months[(month ?? 1) - 1]} ${year}`;
}

/** 'Thu 4 Mar 2027, 17:00, by the clock of Europe/London (UTC+00:00)': for a letter, which may be read in any place. */
export function plainMoment(at: Date, timeZone: string): string {
  const on = localDate(at, timeZone);
  const { time, offset } = localClock(at, timeZone);
  return `${weekdays[weekday(on) - 1]} ${plainDate(on)}, ${time}, by the clock of ${timeZone} (${offset})`;
}
