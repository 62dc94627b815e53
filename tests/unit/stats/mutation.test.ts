/**
 * Is the suite strong enough? jstat is put behind the one door to
 * distributions, and the points and cases that then fail are counted. A suite
 * that passed with it would be too weak to trust.
 */
import { describe, expect, test, vi } from 'vitest';
import { pointsOf, relativeError, type Point } from './distribution-points';
import { differences, inlineOf, loadTopic } from './reference';

vi.mock('@/stats/distributions', () => import('./with-jstat'));
const { clopperPearson } = await import('@/stats/proportion/clopper-pearson');

/** A value that is thrown, NaN or off by more than the topic's stated tolerance counts as caught. */
function caught(points: Point[], tolerance: (point: Point) => number): number {
  return points.filter((point) => {
    try {
      return !(relativeError(point) <= tolerance(point));
    } catch (failure) {
      expect(failure).toBeInstanceOf(Error);
      return true;
    }
  }).length;
}

/** The tolerance that topic 12 states, read at its most generous. */
function stated({ fn, params, x }: Point): number {
  const wide = params.some((value) => value >= 1e5) || ((fn === 'quantile' || fn === 'isf') && x < 1e-50);
  return wide ? 1e-9 : 1e-11;
}

describe('with jstat behind the distributions', () => {
  test('a third of topic 12 fails at its stated tolerance', () => {
    const points = pointsOf('12-distributions');
    const failed = caught(points, stated);
    expect(failed).toBeGreaterThan(points.length / 3);
    expect(failed).toBeLessThan(points.length);
  });

  test('topic 14 catches it at every point recorded as failing there', () => {
    const named = pointsOf('14-weak-library').filter(({ fails_in: failures = [] }) => failures.some((failure) => failure.startsWith('jstat')));
    expect(named.length).toBeGreaterThan(60);
    expect(caught(named, () => 1e-9)).toBe(named.length);
  });

  test('exact limits of proportions fail too, so estimators do not hide it', () => {
    const cases = loadTopic('01-proportions').cases.filter(({ id }) => id.startsWith('prop-'));
    const failed = cases.filter((reference) => {
      const { x: events, n } = inlineOf(reference) as { x: number; n: number };
      const want = (reference.expected as { clopper_pearson: unknown }).clopper_pearson;
      return differences(clopperPearson({ events, n, level: Number(reference.params?.conf) }), want, reference.tolerance).length > 0;
    });
    expect(failed.length).toBeGreaterThan(0);
  });
});
