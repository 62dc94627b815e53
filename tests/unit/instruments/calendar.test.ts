import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { addDays, addMonths, addWorkingDays, dateOfDay, dayNumber, daysBetween, isLocalDate, isoWeek, mondayOf, placeInWindow, visitWindow, weekday, windowGaps } from '@/instruments/calendar';

const day = fc.integer({ min: -30_000, max: 60_000 });
const date = day.map(dateOfDay);

describe('local dates', () => {
  test('agree with the language’s own calendar in UTC, over two centuries', () => {
    fc.assert(fc.property(day, (n) => {
      const iso = new Date(n * 86_400_000).toISOString().slice(0, 10);
      expect(dateOfDay(n)).toBe(iso);
      expect(dayNumber(iso)).toBe(n);
      expect(weekday(iso)).toBe(new Date(n * 86_400_000).getUTCDay() || 7);
    }), { numRuns: 2000 });
  });

  test('exist or do not', () => {
    expect(isLocalDate('2024-02-29')).toBe(true);
    for (const bad of ['2023-02-29', '2024-13-01', '2024-00-10', '2024-04-31', '2024-1-1', 'today', '']) expect(isLocalDate(bad)).toBe(false);
    expect(() => dayNumber('2023-02-29')).toThrow(RangeError);
  });

  test('ISO weeks: examples of ISO 8601 at the year’s edge', () => {
    // ISO 8601: 1 January 2005 lies in 2004-W53, 31 December 2007 in 2008-W01; 30 Dec 2024 in 2025-W01 (check LOAD-22).
    expect([isoWeek('2005-01-01'), isoWeek('2007-12-31'), isoWeek('2024-12-30'), isoWeek('2021-01-03')]).toEqual(['2004-W53', '2008-W01', '2025-W01', '2020-W53']);
    fc.assert(fc.property(date, (on) => {
      expect(isoWeek(mondayOf(on))).toBe(isoWeek(on));
      expect(isoWeek(addDays(mondayOf(on), 6))).toBe(isoWeek(on));
      expect(isoWeek(addDays(mondayOf(on), 7))).not.toBe(isoWeek(on));
    }));
  });

  test('adding months never leaves the month it aims at', () => {
    expect(addMonths('2024-01-31', 1)).toBe('2024-02-29');
    expect(addMonths('2024-03-31', -13)).toBe('2023-02-28');
    fc.assert(fc.property(date, fc.integer({ min: -60, max: 60 }), (on, months) => {
      const moved = addMonths(on, months);
      expect(isLocalDate(moved)).toBe(true);
      const monthOf = (d: string): number => Number(d.slice(0, 4)) * 12 + Number(d.slice(5, 7));
      expect(monthOf(moved) - monthOf(on)).toBe(months);
    }));
  });

  test('working days pass over weekends and holidays', () => {
    expect(addWorkingDays('2027-03-05', 1)).toBe('2027-03-08');
    expect(addWorkingDays('2027-03-03', 2)).toBe('2027-03-05');
    expect(addWorkingDays('2027-03-05', 1, ['2027-03-08'])).toBe('2027-03-09');
  });
});

describe('a visit window', () => {
  const window = visitWindow({ anchorOn: '2024-02-15', offsetDays: 91, beforeDays: 14, afterDays: 7 });
  test('holds both its ends', () => {
    expect(window).toEqual({ targetOn: '2024-05-16', opensOn: '2024-05-02', closesOn: '2024-05-23' });
    expect(placeInWindow(window, '2024-05-02')).toEqual({ status: 'in', deltaDays: -14 });
    expect(placeInWindow(window, '2024-05-01').status).toBe('early');
    expect(placeInWindow(window, '2024-05-23').status).toBe('in');
    expect(placeInWindow(window, '2024-05-24')).toEqual({ status: 'late', deltaDays: 8 });
  });

  test('that shares a day with the next one overlaps it', () => {
    const pair = (afterDays: number) => windowGaps([{ offsetDays: 120, beforeDays: 14, afterDays: 14 }, { offsetDays: 91, beforeDays: 14, afterDays }]);
    expect(pair(15)).toEqual({ gapsDays: [0], overlap: true });
    expect(pair(14)).toEqual({ gapsDays: [1], overlap: false });
    expect(daysBetween({ from: '2024-05-30', to: '2024-05-16' })).toBe(-14);
  });
});
