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
  formatSigned,
  formatTime,
  formatVolumeMl,
} from '@/components/ui/format';
import { printNumber } from '@/instruments/numbers';
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

describe('halves go away from zero, by the digits as they are written', () => {
  /** Whole tenths or half tenths, rounded on integers alone. */
  const twin = (halfMm: number): string => {
    const tenths = Math.floor((Math.abs(halfMm) + 1) / 2);
    return `${halfMm < 0 && tenths > 0 ? '\u2212' : ''}${Math.floor(tenths / 10)}.${tenths % 10}`;
  };
  it('girths settled between two trials', () => {
    expect([228.5, 377.5, 266.5, 264.5, 355.5].map((mm) => formatGirthCm(mm))).toEqual(['22.9 cm', '37.8 cm', '26.7 cm', '26.5 cm', '35.6 cm']);
    expect([22.85, 37.75, 26.65, 26.45, 35.55, -26.65].map((cm) => formatNumber(cm, 1))).toEqual(['22.9', '37.8', '26.7', '26.5', '35.6', '\u221226.7']);
    expect(formatSigned(-0.05)).toBe('\u22120.1');
    expect(formatSigned(0.05)).toBe('+0.1');
    expect(formatSigned(0.04)).toBe('0.0');
  });
  it('every half millimetre, against whole numbers alone', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1998, max: 1998 }), (halfMm) => {
        expect(formatNumber(halfMm / 2 / 10, 1)).toBe(twin(halfMm));
      }),
    );
  });
  it('proportions too, without the error of a factor of a hundred', () => {
    expect(formatPercent(0.285, 0)).toBe('29\u202f%');
    expect(formatPercent(0.0285)).toBe('2.9\u202f%');
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 20_000 }), (halfTenths) => {
        const tenths = Math.floor((halfTenths + 1) / 2);
        expect(formatPercent(halfTenths / 2000)).toBe(`${Math.floor(tenths / 10) >= 1000 ? `1\u2009000` : Math.floor(tenths / 10)}.${tenths % 10}\u202f%`);
      }),
    );
  });
  it('figures far off the scale of the registry print as they are', () => {
    expect(formatNumber(1e-9, 1)).toBe('0.0');
    expect(formatNumber(-1e-9, 1)).toBe('0.0');
    expect(formatNumber(0.49999999999999994)).toBe('0');
    expect(formatNumber(123456789012.5)).toBe('123\u2009456\u2009789\u2009013');
  });
  it('the sentences of the checks round as the tables do', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1998, max: 1998 }), (halfMm) => {
        expect(printNumber(halfMm / 20, 1)).toBe(twin(halfMm));
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
