const dayMs = 86_400_000;
const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const;

/** Whole days since 1 Jan 1970 of a calendar day `yyyy-mm-dd`. Throws RangeError for anything else. */
export function dayNumber(day: string): number {
  const ms = Date.parse(`${day}T00:00:00Z`);
  if (Number.isNaN(ms)) throw new RangeError(`A day reads yyyy-mm-dd, not ${day}.`);
  return ms / dayMs;
}

/** The calendar day of a day number. */
export function dayOf(number: number): string {
  return new Date(number * dayMs).toISOString().slice(0, 10);
}

/** '8 Feb'. */
export function shortDay(day: string): string {
  return `${Number(day.slice(8, 10))} ${monthName(day)}`;
}

/** 'Feb'. */
export function monthName(day: string): string {
  return months[Number(day.slice(5, 7)) - 1] ?? '';
}

/** First days of the months that touch a span, from the month of `from` to the one after `to`. */
export function monthStarts(from: string, to: string): string[] {
  const starts: string[] = [];
  let year = Number(from.slice(0, 4));
  let month = Number(from.slice(5, 7));
  const last = to.slice(0, 7);
  for (;;) {
    const start = `${year}-${String(month).padStart(2, '0')}-01`;
    starts.push(start);
    if (start.slice(0, 7) > last) return starts;
    month += 1;
    if (month > 12) {
      month = 1;
      year += 1;
    }
  }
}
