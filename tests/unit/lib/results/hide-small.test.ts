import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { viewFlow } from '@/lib/results/flow';
import { foldSmall, hiddenAmong, showCount } from '@/lib/results/hide-small';

const below = 5;
const reasons = fc.array(fc.nat(30), { maxLength: 8 }).map((counts) => counts.map((count, index) => ({ reason: `reason ${index}`, count })));

describe('small counts', () => {
  test('are hidden from one up to the limit, and nought is shown', () => {
    expect([0, 1, 4, 5, 6].map((count) => showCount(count, below))).toEqual([0, null, null, 5, 6]);
    expect(showCount(1, 0)).toBe(1);
  });

  test('are put together with the next smallest, as told', () => {
    expect(foldSmall([{ reason: 'a', count: 40 }, { reason: 'b', count: 6 }, { reason: 'c', count: 2 }], below)).toEqual([{ reason: 'a', count: 40 }, { reason: 'b or c', count: 8 }]);
    expect(foldSmall([{ reason: 'a', count: 40 }, { reason: 'b', count: 4 }, { reason: 'c', count: 3 }], below)).toEqual([{ reason: 'a', count: 40 }, { reason: 'b or c', count: 7 }]);
    expect(foldSmall([{ reason: 'a', count: 3 }], below)).toEqual([{ reason: 'a', count: null }]);
  });

  test('never come back from a total that is at least the limit', () => {
    fc.assert(
      fc.property(reasons, (list) => {
        const folded = foldSmall(list, below);
        const total = list.reduce((sum, { count }) => sum + count, 0);
        const hidden = folded.filter(({ count }) => count === null);
        expect(hidden.length === 0 || (total < below && total > 0)).toBe(true);
        if (hidden.length === 0) expect(folded.reduce((sum, { count }) => sum + (count ?? 0), 0)).toBe(total);
        expect(folded.every(({ count }) => count === null || count === 0 || count >= below)).toBe(true);
      }),
    );
  });

  test('leave no difference between two stages of the flow', () => {
    const whole = fc.record({ screened: fc.nat(300), lost: fc.array(fc.nat(40), { minLength: 5, maxLength: 5 }), notDue: fc.nat(20) });
    fc.assert(
      fc.property(whole, ({ screened, lost, notDue }) => {
        const [a = 0, b = 0, c = 0, d = 0, e = 0] = lost;
        const enrolled = Math.max(0, screened - a);
        const withBaseline = Math.max(0, enrolled - b);
        const measured = [c, d, e].reduce<number[]>((list, gone) => [...list, Math.max(0, (list.at(-1) ?? withBaseline) - gone)], []);
        const followed = measured.map((count, index) => ({ months: (index + 1) * 6, measured: count, due: Math.max(count, (index === 0 ? withBaseline : (measured[index - 1] ?? 0)) - notDue) }));
        const flow = viewFlow({ screened, screening: 0, notEnrolled: [{ reason: 'Not eligible', count: screened - enrolled }], enrolled, withBaseline, followed, left: [] }, below);
        for (const [index, stage] of flow.entries()) {
          const next = flow[index + 1];
          expect(stage.people).toBeGreaterThanOrEqual(below);
          if (next) expect([0, below]).toContain(Math.min(below, stage.people - next.people));
          const gone = stage.out?.reasons ?? [];
          if (next && gone.every(({ count }) => count !== null)) expect(gone.reduce((sum, { count }) => sum + (count ?? 0), 0)).toBe(stage.people - next.people);
        }
      }),
    );
  });
});

describe('parts of a whole', () => {
  test('by hand: 53 of 57 hides both, and three sites of which one is small hide two', () => {
    expect([...hiddenAmong([53, 4], below)].toSorted()).toEqual([0, 1]);
    expect([...hiddenAmong([20, 3, 9], below)].toSorted()).toEqual([1, 2]);
    expect([...hiddenAmong([20, 3, 4, 0], below)].toSorted()).toEqual([1, 2]);
    expect([...hiddenAmong([20, 9, 0], below)]).toEqual([]);
    expect([...hiddenAmong([4, 1], 0)]).toEqual([]);
  });

  test('leave nothing small to be had from the whole less what is shown', () => {
    fc.assert(
      fc.property(fc.array(fc.nat(40), { maxLength: 7 }), (parts) => {
        const hidden = hiddenAmong(parts, below);
        expect(parts.every((count, place) => count === 0 || count >= below || hidden.has(place))).toBe(true);
        const rest = [...hidden].reduce((sum, place) => sum + (parts[place] ?? 0), 0);
        // Fewer than five in all: every part is hidden, and the whole itself is not shown.
        if (parts.reduce((sum, count) => sum + count, 0) >= below) expect(rest === 0 || rest >= below).toBe(true);
      }),
    );
  });
});
