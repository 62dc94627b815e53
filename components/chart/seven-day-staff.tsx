import type { ReactNode } from 'react';

export interface StaffDay {
  /** `yyyy-mm-dd`. */
  day: string;
  /** 'Mon 1'; today prints 'Today' for the weekday. */
  weekday: string;
  date: number;
  today?: boolean;
  /** What is on that day; none prints 'Rest'. */
  items?: ReactNode;
}

/** The week on its own seven-day staff. */
export function SevenDayStaff({ days, label }: { days: readonly StaffDay[]; label: string }) {
  return (
    <ol className="week-staff" aria-label={label}>
      {days.map(({ day, weekday, date, today, items }) => (
        <li key={day} className={today ? 'week-today' : undefined} aria-current={today ? 'date' : undefined}>
          <span className="week-day">
            {today ? <b>Today</b> : weekday} <span className="t-num">{date}</span>
          </span>
          <span className="week-post" aria-hidden="true" />
          <div className="week-items">{items ?? <p className="text-ink-3">Rest</p>}</div>
        </li>
      ))}
    </ol>
  );
}
