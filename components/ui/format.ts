import { fixedDigits, percentOf, roundHalfAway } from '@/instruments/numbers';

/**
 * The one way this registry prints dates, times and figures. Pure functions:
 * the moment, the zone and the unit are always given, never guessed.
 */

const minus = '\u2212';
const thin = '\u2009';
const narrow = '\u202f';
const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const;
const weekdays = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'] as const;
const dayMs = 86_400_000;

/** A calendar day as `yyyy-mm-dd`, or a moment that is first turned into a day in `zone`. */
export type Day = string | Date;

interface Parts {
  year: number;
  month: number;
  day: number;
}

/** Throws RangeError for anything but a real calendar day or a valid moment. */
function parts(day: Day, zone: string): Parts {
  const iso = typeof day === 'string' ? day : dayIn(day, zone);
  const found = /^(\d{4})-(\d{2})-(\d{2})$/.exec(iso);
  if (!found) throw new RangeError(`A day reads yyyy-mm-dd, not ${iso}.`);
  const [year, month, date] = [Number(found[1]), Number(found[2]), Number(found[3])];
  const check = new Date(Date.UTC(year, month - 1, date));
  if (check.getUTCMonth() !== month - 1 || check.getUTCDate() !== date) throw new RangeError(`${iso} is not a day of the calendar.`);
  return { year, month, day: date };
}

const clocks = {
  day: { options: { year: 'numeric', month: '2-digit', day: '2-digit' }, made: new Map<string, Intl.DateTimeFormat>() },
  time: { options: { hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }, made: new Map<string, Intl.DateTimeFormat>() },
} as const;

/** The clock of a zone. Making one costs as much as thirty readings, and a long list reads thousands: each is made once. */
function clockOf(kind: keyof typeof clocks, zone: string): Intl.DateTimeFormat {
  const { options, made } = clocks[kind];
  const clock = made.get(zone) ?? new Intl.DateTimeFormat('en-GB', { timeZone: zone, ...options });
  made.set(zone, clock);
  return clock;
}

/** The calendar day of a moment in a zone, as `yyyy-mm-dd`. Throws RangeError for an invalid moment or zone. */
export function dayIn(moment: Date, zone: string): string {
  const fields = clockOf('day', zone).formatToParts(moment);
  const pick = (type: string) => fields.find((field) => field.type === type)?.value ?? '';
  return `${pick('year').padStart(4, '0')}-${pick('month')}-${pick('day')}`;
}

/** Whole days from one calendar day to another; negative when `to` is earlier. */
export function daysBetween(from: string, to: string): number {
  const [a, b] = [parts(from, 'UTC'), parts(to, 'UTC')];
  return Math.round((Date.UTC(b.year, b.month - 1, b.day) - Date.UTC(a.year, a.month - 1, a.day)) / dayMs);
}

/** '3 Mar 2027'. */
export function formatDate(day: Day, zone = 'UTC'): string {
  const { year, month, day: date } = parts(day, zone);
  return `${date} ${months[month - 1]} ${year}`;
}

/** 'Fri 5 Mar': weekday when near, no year. */
export function formatNearDate(day: Day, zone = 'UTC'): string {
  const { year, month, day: date } = parts(day, zone);
  const weekday = weekdays[new Date(Date.UTC(year, month - 1, date)).getUTCDay()];
  return `${weekday} ${date} ${months[month - 1]}`;
}

/** '5 to 9 Mar 2027', '19 May to 30 Jun 2027', '20 Dec 2026 to 3 Jan 2027'; one day prints once. */
export function formatDateRange(from: Day, to: Day, zone = 'UTC'): string {
  const [a, b] = [parts(from, zone), parts(to, zone)];
  const end = formatDate(to, zone);
  if (a.year !== b.year) return `${formatDate(from, zone)} to ${end}`;
  if (a.month !== b.month) return `${a.day} ${months[a.month - 1]} to ${end}`;
  return a.day === b.day ? end : `${a.day} to ${end}`;
}

/** '10:40', 24 hours, in the zone. */
export function formatTime(moment: Date, zone: string): string {
  return clockOf('time', zone).format(moment);
}

/** '3 Mar 2027, 10:40'. The zone itself is said once, in the footer. */
export function formatMoment(moment: Date, zone: string): string {
  return `${formatDate(moment, zone)}, ${formatTime(moment, zone)}`;
}

/** '14 days late', '1 day late', 'today', 'in 5 days': a due day against today, both calendar days. */
export function formatDue(due: string, today: string): string {
  const left = daysBetween(today, due);
  if (left === 0) return 'today';
  return left < 0 ? `${countOf(-left, 'day')} late` : `in ${countOf(left, 'day')}`;
}

/** '2 h 48 min ago', '3 days ago', 'just now'; 'in 2 h' for a moment to come. */
export function formatAge(moment: Date, now: Date): string {
  const minutes = Math.floor(Math.abs(now.getTime() - moment.getTime()) / 60_000);
  if (minutes === 0) return 'just now';
  const span = minutes < 60 ? `${minutes} min` : minutes < 2880 ? hoursAndMinutes(minutes) : countOf(Math.floor(minutes / 1440), 'day');
  return moment > now ? `in ${span}` : `${span} ago`;
}

function hoursAndMinutes(minutes: number): string {
  const rest = minutes % 60;
  return rest === 0 ? `${Math.floor(minutes / 60)} h` : `${Math.floor(minutes / 60)} h ${rest} min`;
}

/** '1 query', '3 queries', '48 102 entries'. The plural is the noun with s unless given. */
export function countOf(count: number, noun: string, plural = `${noun}s`): string {
  return `${formatCount(count)} ${count === 1 ? noun : plural}`;
}

/** A figure with fixed decimals, halves away from zero, thin space for thousands, true minus. Throws RangeError for what is not finite. */
export function formatNumber(value: number, decimals = 0): string {
  if (!Number.isFinite(value)) throw new RangeError(`${value} is not a figure that can be printed.`);
  const text = fixedDigits(value, decimals);
  const [whole = '0', part] = text.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, thin);
  const sign = value < 0 && Number(text) !== 0 ? minus : '';
  return `${sign}${grouped}${part ? `.${part}` : ''}`;
}

/** '48 102'. */
export function formatCount(count: number): string {
  return formatNumber(count, 0);
}

/** '2 089 mL', to 1 mL. */
export function formatVolumeMl(volumeMl: number): string {
  return `${formatNumber(volumeMl)} mL`;
}

/** '25.9 cm' from millimetres, to 0.1 cm, as the tape is read; a settled girth of 228.5 mm prints as 22.9. */
export function formatGirthCm(circumferenceMm: number): string {
  return `${formatNumber(circumferenceMm / 10, 1)} cm`;
}

/** '+5.1 %' from a proportion (0.051), to 0.1 %, always with its sign; zero has none. */
export function formatChange(proportion: number): string {
  return `${formatSigned(percentOf(proportion), 1)}${narrow}%`;
}

/** '+5.1', '−4.0', '0.0': a figure whose sign matters. */
export function formatSigned(value: number, decimals = 1): string {
  const text = formatNumber(value, decimals);
  return value > 0 && roundHalfAway(value, decimals) !== 0 ? `+${text}` : text;
}

/** '24.3 %' from a proportion (0.243). */
export function formatPercent(proportion: number, decimals = 1): string {
  return `${formatNumber(percentOf(proportion), decimals)}${narrow}%`;
}

/** '7.0 kg', or '7 kg' when `short`, in steps of 0.5 kg as they are logged. */
export function formatLoadKg(loadKg: number, short = false): string {
  return `${formatNumber(loadKg, short && Number.isInteger(loadKg) ? 0 : 1)} kg`;
}

/** '5.0 to 16.4': the limits of an interval given as proportions, in percent without the sign. */
export function formatLimits(lower: number, upper: number, decimals = 1): string {
  return `${formatNumber(percentOf(lower), decimals)} to ${formatNumber(percentOf(upper), decimals)}`;
}
