/**
 * The only place in lib that makes moments. Calendar dates are 'YYYY-MM-DD' strings;
 * arithmetic on them stands in instruments/calendar.
 */

/** The machine's clock, read once a transaction. */
export const clock = (): Date => new Date();

/** A moment from what the data base returned (raw SQL gives timestamptz as text). */
export function moment(value: Date | string): Date {
  return value instanceof Date ? value : new Date(value);
}

/** A moment some seconds later (or earlier). */
export const secondsAfter = (at: Date, seconds: number): Date => new Date(at.getTime() + seconds * 1000);

const formats = new Map<string, Intl.DateTimeFormat>();

/** The clock of a time zone. Making one costs as much as thirty readings, so each is made once. */
function clockOf(timeZone: string): Intl.DateTimeFormat {
  const known = formats.get(timeZone);
  if (known) return known;
  const made = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
    hourCycle: 'h23',
    timeZoneName: 'longOffset',
  });
  formats.set(timeZone, made);
  return made;
}

const partsIn = (at: Date, timeZone: string): Record<string, string> =>
  Object.fromEntries(
    clockOf(timeZone)
      .formatToParts(at)
      .map(({ type, value }) => [type, value]),
  );

/** The calendar date at a moment, where the clock of `timeZone` hangs. */
export function localDate(at: Date, timeZone: string): string {
  const { year, month, day } = partsIn(at, timeZone);
  return `${year}-${month}-${day}`;
}

/** What the clock of `timeZone` shows at a moment, and how far it stands from UTC: { time: '17:00', offset: 'UTC+01:00' }. */
export function localClock(at: Date, timeZone: string): { time: string; offset: string } {
  const { hour, minute, timeZoneName = 'GMT' } = partsIn(at, timeZone);
  return { time: `${hour}:${minute}`, offset: timeZoneName === 'GMT' ? 'UTC+00:00' : timeZoneName.replace('GMT', 'UTC') };
}

/** The moment at which the clock of `timeZone` shows a local date and time ('HH:MM'). In a skipped hour, the moment after it. */
export function momentAt(date: string, time: string, timeZone: string): Date {
  const wanted = Date.parse(`${date}T${time}:00Z`);
  let guess = wanted;
  for (let pass = 0; pass < 3; pass += 1) {
    const { year, month, day, hour, minute, second } = partsIn(new Date(guess), timeZone);
    const shown = Date.parse(`${year}-${month}-${day}T${hour}:${minute}:${second}Z`);
    if (shown === wanted) break;
    guess += wanted - shown;
  }
  return new Date(guess);
}
