import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  countOf,
  dayIn,
  daysBetween,
  formatAge,
  formatChange,
  formatDate,
  formatDateRange,
  formatDue,
  formatGirthCm,
  formatLoadKg,
  formatNearDate,
  formatNumber,
  formatPercent,
  formatTime,
  formatVolumeMl,
} from '@/components/ui/format';
import { readNumber } from '@/components/ui/read-number';

const zone = 'Europe/London';

describe('dates print as the look asks', () => {
  it('a day, a near day, a range', () => {
    expect(formatDate('2027-03-03')).toBe('3 Mar 2027');
    expect(formatNearDate('2027-03-05')).toBe('Fri 5 Mar');
    expect(formatDateRange('2027-05-19', '2027-06-30')).toBe('19 May to 30 Jun 2027');
    expect(formatDateRange('2027-03-05', '2027-03-09')).toBe('5 to 9 Mar 2027');
    expect(formatDateRange('2026-12-20', '2027-01-03')).toBe('20 Dec 2026 to 3 Jan 2027');
    expect(formatDateRange('2027-03-03', '2027-03-03')).toBe('3 Mar 2027');
  });
  it('a moment belongs to the day of its zone', () => {
    const lateInSummer = new Date('2027-06-30T23:30:00Z');
    expect(dayIn(lateInSummer, zone)).toBe('2027-07-01');
    expect(formatDate(lateInSummer, 'UTC')).toBe('30 Jun 2027');
    expect(formatTime(lateInSummer, zone)).toBe('00:30');
  });
  it('refuses what is no day of the calendar', () => {
    expect(() => formatDate('2027-02-30')).toThrow(RangeError);
    expect(() => formatDate('3/3/2027')).toThrow(RangeError);
  });
  it('counts whole days over the clock change', () => {
    expect(daysBetween('2027-03-27', '2027-03-29')).toBe(2);
  });
});

describe('ages print as the look asks', () => {
  const now = new Date('2027-03-03T10:40:00Z');
  it('lateness in whole days', () => {
    expect(formatDue('2027-02-17', '2027-03-03')).toBe('14 days late');
    expect(formatDue('2027-03-02', '2027-03-03')).toBe('1 day late');
    expect(formatDue('2027-03-03', '2027-03-03')).toBe('today');
    expect(formatDue('2027-03-08', '2027-03-03')).toBe('in 5 days');
  });
  it('hours and minutes, then days', () => {
    expect(formatAge(new Date('2027-03-03T07:52:00Z'), now)).toBe('2 h 48 min ago');
    expect(formatAge(new Date('2027-03-03T10:39:40Z'), now)).toBe('just now');
    expect(formatAge(new Date('2027-02-28T10:40:00Z'), now)).toBe('3 days ago');
    expect(formatAge(new Date('2027-03-03T12:40:00Z'), now)).toBe('in 2 h');
  });
});

describe('figures carry thin spaces, a true minus and their unit', () => {
  it('as on the boards', () => {
    expect(formatVolumeMl(2089)).toBe('2\u2009089 mL');
    expect(formatGirthCm(259)).toBe('25.9 cm');
    expect(formatChange(0.051)).toBe('+5.1\u202f%');
    expect(formatChange(-0.04)).toBe('\u22124.0\u202f%');
    expect(formatChange(0)).toBe('0.0\u202f%');
    expect(formatPercent(0.243)).toBe('24.3\u202f%');
    expect(formatLoadKg(7.5)).toBe('7.5 kg');
    expect(formatLoadKg(7, true)).toBe('7 kg');
    expect(countOf(1, 'query', 'queries')).toBe('1 query');
    expect(countOf(48102, 'entry', 'entries')).toBe('48\u2009102 entries');
  });
  it('what rounds to zero has no sign', () => {
    expect(formatChange(-0.0001)).toBe('0.0\u202f%');
    expect(formatChange(0.0001)).toBe('0.0\u202f%');
  });
  it('refuses what is not a number', () => {
    expect(() => formatNumber(Number.NaN)).toThrow(RangeError);
  });
  it('a printed figure reads back as the same figure', () => {
    fc.assert(
      fc.property(fc.integer({ min: -9_999_999, max: 9_999_999 }), (tenths) => {
        const read = readNumber(formatNumber(tenths / 10, 1));
        expect(read).toEqual({ kind: 'number', value: tenths === 0 ? 0 : tenths / 10 });
      }),
    );
  });
});

describe('typed figures', () => {
  it('a decimal comma is a decimal', () => expect(readNumber('71,4')).toEqual({ kind: 'number', value: 71.4 }));
  it('nothing typed is empty, not zero', () => expect(readNumber('  ')).toEqual({ kind: 'empty' }));
  it('a comma before three digits can be read in two ways', () => expect(readNumber('1,234').kind).toBe('unclear'));
  it('words and units are not figures', () => {
    expect(readNumber('74 kg').kind).toBe('unclear');
    expect(readNumber('1.2.3').kind).toBe('unclear');
    expect(readNumber('1e3').kind).toBe('unclear');
  });
});
