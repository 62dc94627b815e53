/**
 * Whole-day arithmetic on local dates written 'YYYY-MM-DD'. No clock and no time zone: whoever knows the zone makes
 * the local date first. Day numbers count from 1970-01-01 in the proleptic Gregorian calendar.
 */
export type LocalDate = string;

const PATTERN = /^(\d{4})-(\d{2})-(\d{2})$/;

/** True for a date that exists: 2024-02-29 does, 2023-02-29 does not. */
export function isLocalDate(text: string): boolean {
  const match = PATTERN.exec(text);
  if (!match) return false;
  const [year, month, day] = match.slice(1).map(Number) as [number, number, number];
  return month >= 1 && month <= 12 && day >= 1 && day <= daysInMonth(year, month);
}

function parts(date: LocalDate): [number, number, number] {
  if (!isLocalDate(date)) throw new RangeError(`‘${date}’ is not a date written YYYY-MM-DD.`);
  return date.split('-').map(Number) as [number, number, number];
}

/** Throws RangeError on a date that does not exist. */
export function dayNumber(date: LocalDate): number {
  const [year, month, day] = parts(date);
  const shifted = month <= 2 ? year - 1 : year;
  const era = Math.floor(shifted / 400);
  const yearOfEra = shifted - era * 400;
  const dayOfYear = Math.floor((153 * (month + (month > 2 ? -3 : 9)) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * 146097 + dayOfEra - 719468;
}

export function dateOfDay(day: number): LocalDate {
  const z = day + 719468;
  const era = Math.floor(z / 146097);
  const dayOfEra = z - era * 146097;
  const yearOfEra = Math.floor((dayOfEra - Math.floor(dayOfEra / 1460) + Math.floor(dayOfEra / 36524) - Math.floor(dayOfEra / 146096)) / 365);
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const mp = Math.floor((5 * dayOfYear + 2) / 153);
  const month = mp < 10 ? mp + 3 : mp - 9;
  return written(yearOfEra + era * 400 + (month <= 2 ? 1 : 0), month, dayOfYear - Math.floor((153 * mp + 2) / 5) + 1);
}

function written(year: number, month: number, day: number): LocalDate {
  return `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
}

function daysInMonth(year: number, month: number): number {
  const isLeap = (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;
  return month === 2 ? (isLeap ? 29 : 28) : [4, 6, 9, 11].includes(month) ? 30 : 31;
}

export function addDays(date: LocalDate, days: number): LocalDate {
  return dateOfDay(dayNumber(date) + days);
}

/** Whole days from one date to another; negative when `to` lies before `from`. */
export function daysBetween({ from, to }: { from: LocalDate; to: LocalDate }): number {
  return dayNumber(to) - dayNumber(from);
}

/** Adds calendar months; a day the month does not have becomes its last day (31 Aug + 6 → 28 Feb). */
export function addMonths(date: LocalDate, months: number): LocalDate {
  const [year, month, day] = parts(date);
  const index = year * 12 + month - 1 + months;
  const toYear = Math.floor(index / 12);
  const toMonth = index - toYear * 12 + 1;
  return written(toYear, toMonth, Math.min(day, daysInMonth(toYear, toMonth)));
}

/** 1 = Monday … 7 = Sunday. */
export function weekday(date: LocalDate): number {
  return ((((dayNumber(date) + 3) % 7) + 7) % 7) + 1;
}

/** The Monday of the date's ISO week; two dates are in one week when their Mondays agree. */
export function mondayOf(date: LocalDate): LocalDate {
  return addDays(date, 1 - weekday(date));
}

/** '2025-W01'; the week belongs to the year its Thursday lies in (ISO 8601). */
export function isoWeek(date: LocalDate): string {
  const thursday = addDays(mondayOf(date), 3);
  const year = parts(thursday)[0];
  const week = Math.floor(daysBetween({ from: written(year, 1, 1), to: thursday }) / 7) + 1;
  return `${year}-W${String(week).padStart(2, '0')}`;
}

/** The date `days` working days (Monday to Friday, less `holidays`) after `date`. */
export function addWorkingDays(date: LocalDate, days: number, holidays: readonly LocalDate[] = []): LocalDate {
  let current = date;
  for (let left = days; left > 0; ) {
    current = addDays(current, 1);
    if (weekday(current) <= 5 && !holidays.includes(current)) left -= 1;
  }
  return current;
}

export interface VisitWindow {
  readonly targetOn: LocalDate;
  readonly opensOn: LocalDate;
  readonly closesOn: LocalDate;
}

/** Both ends belong to the window. */
export function visitWindow({ anchorOn, offsetDays, beforeDays, afterDays }: { anchorOn: LocalDate; offsetDays: number; beforeDays: number; afterDays: number }): VisitWindow {
  const targetOn = addDays(anchorOn, offsetDays);
  return { targetOn, opensOn: addDays(targetOn, -beforeDays), closesOn: addDays(targetOn, afterDays) };
}

/** Where a visit that took place on `actualOn` lies; `deltaDays` is from the target, late positive. */
export function placeInWindow(window: VisitWindow, actualOn: LocalDate): { status: 'in' | 'early' | 'late'; deltaDays: number } {
  const deltaDays = daysBetween({ from: window.targetOn, to: actualOn });
  if (daysBetween({ from: actualOn, to: window.opensOn }) > 0) return { status: 'early', deltaDays };
  return { status: daysBetween({ from: window.closesOn, to: actualOn }) > 0 ? 'late' : 'in', deltaDays };
}

/**
 * Days left between one window's close and the next one's opening, in order of target; windows overlap when any is
 * below one, for then a day would belong to two visits.
 */
export function windowGaps(windows: readonly { offsetDays: number; beforeDays: number; afterDays: number }[]): { gapsDays: number[]; overlap: boolean } {
  const ordered = windows.toSorted((a, b) => a.offsetDays - b.offsetDays);
  const gapsDays = ordered.slice(1).map((next, i) => {
    const previous = ordered[i] ?? next;
    return next.offsetDays - next.beforeDays - (previous.offsetDays + previous.afterDays);
  });
  return { gapsDays, overlap: gapsDays.some((gap) => gap < 1) };
}
