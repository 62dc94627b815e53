import { daysBetween, type LocalDate } from '@/instruments/calendar';
import { localDate, momentAt } from '@/lib/work/time';

const MINUTE = 60_000;

/** The demonstration's time: one moment called now, and the clocks that hang at the sites. */
export class DemoClock {
  private readonly midnights = new Map<string, number>();
  private readonly todays = new Map<string, LocalDate>();

  constructor(readonly now: Date) {}

  /** The date at a site, now. */
  today(timeZone: string): LocalDate {
    const known = this.todays.get(timeZone) ?? localDate(this.now, timeZone);
    this.todays.set(timeZone, known);
    return known;
  }

  /** The moment at which a site's clock shows a time; `minutes` count from midnight and may run into the next day. */
  at(date: LocalDate, minutes: number, timeZone: string): Date {
    const key = `${timeZone} ${date}`;
    // Working time starts after any change of the clocks, so noon fixes the day's offset.
    const noon = this.midnights.get(key) ?? momentAt(date, '12:00', timeZone).getTime();
    this.midnights.set(key, noon);
    return new Date(noon + Math.round((minutes - 720) * MINUTE));
  }

  isPast(at: Date): boolean {
    return at.getTime() <= this.now.getTime();
  }

  /** Days since a site's date; negative in the future. */
  age(date: LocalDate, timeZone: string): number {
    return daysBetween({ from: date, to: this.today(timeZone) });
  }
}

export const minutesAfter = (at: Date, minutes: number): Date => new Date(at.getTime() + Math.round(minutes * MINUTE));
