import { describe, expect, it } from 'vitest';
import { exampleTide } from '@/components/chart/tide-chart.examples';
import { edges, field, niceStep, tideScale } from '@/components/chart/tide-scale';
import { dayNumber, dayOf, monthStarts } from '@/components/chart/days';
import { stepAt, type Curve } from '@/components/chart/survival-chart';

describe('the tide chart’s scales', () => {
  it('hold the board’s geometry: 16 % over 214 pixels', () => {
    const scale = tideScale(exampleTide);
    expect(scale.change(0)).toBeCloseTo(212.5, 6);
    expect(scale.change(10)).toBeCloseTo(78.75, 6);
    expect(scale.changeEdges).toEqual([-4, -2, 0, 2, 4, 6, 8, 10, 12]);
  });
  it('widen for a value beyond the board', () => {
    const visits = [{ key: 'v', name: 'Extra', on: '2027-01-01', dateWords: '', changePercent: 41, trialsPercent: [39, 43] as const }];
    const scale = tideScale({ ...exampleTide, visits });
    expect(scale.change(43)).toBeGreaterThanOrEqual(field.armTop);
    expect(scale.change(-4)).toBeLessThanOrEqual(field.armFoot);
  });
  it('refuse an axis that runs backward', () => expect(() => tideScale({ ...exampleTide, to: exampleTide.from })).toThrow(RangeError));
});

describe('edges and days', () => {
  it('cover both ends', () => expect(edges(-3.2, 7.1, 2)).toEqual([-4, -2, 0, 2, 4, 6, 8]));
  it('take round steps', () => expect([0.3, 1, 1.2, 3, 7, 240].map(niceStep)).toEqual([0.5, 1, 2, 5, 10, 250]));
  it('go to and from day numbers', () => {
    expect(dayNumber('1970-01-02')).toBe(1);
    expect(dayOf(dayNumber('2028-02-29'))).toBe('2028-02-29');
  });
  it('months run over the year', () =>
    expect(monthStarts('2026-11-20', '2027-01-05')).toEqual(['2026-11-01', '2026-12-01', '2027-01-01', '2027-02-01']));
});

describe('reading a curve', () => {
  const curve: Curve = {
    label: 'A',
    definition: '',
    lastTime: 18,
    atRisk: [],
    steps: [
      { time: 3, share: 0.1, lower: 0.05, upper: 0.2 },
      { time: 6, share: 0.2, lower: 0.1, upper: 0.3 },
    ],
  };
  it('a step holds from its own time until the next', () => {
    expect(stepAt(curve, 2.99)).toBeNull();
    expect(stepAt(curve, 3)?.share).toBe(0.1);
    expect(stepAt(curve, 5.99)?.share).toBe(0.1);
    expect(stepAt(curve, 17)?.share).toBe(0.2);
  });
});
