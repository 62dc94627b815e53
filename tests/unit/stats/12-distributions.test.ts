import { describe, expect, test } from 'vitest';
import { pointsOf, relativeError, type Point } from './distribution-points';

/**
 * The stated tolerance is 1e-11, and 1e-9 for quantiles of p < 1e-50 or
 * parameters from 1e5 up. The core does better, so the bar is 1e-12 for all.
 */
const BAR = 1e-12;

describe.each(['12-distributions', '14-weak-library'])('%s against 60-digit arithmetic', (topic) => {
  const points = pointsOf(topic);
  const nameOf = ({ dist, fn }: Point) => `${dist}.${fn}`;
  test.each([...new Set(points.map(nameOf))])('%s', (name) => {
    const missed = points.filter((point) => nameOf(point) === name && !(relativeError(point) <= BAR));
    expect(missed).toEqual([]);
  });
});

test('no point is left out', () => {
  expect(pointsOf('12-distributions')).toHaveLength(1704);
  expect(pointsOf('14-weak-library')).toHaveLength(147);
});
