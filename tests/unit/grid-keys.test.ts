import { describe, expect, test } from 'vitest';
import { cellName, cellOf, cellsInOrder, columnsOf, nextCell, stepOf, type GridCell } from '@/components/measurement/grid-keys';
import { columnMm, doubtsOf, drawnMm, isHalfTyped, readCell, sittingOf, thirdLevels, typedFrom } from '@/components/measurement/typed-sitting';

const columns = columnsOf(3, { left: [1], right: [] });
const cell = (name: string): GridCell => {
  const found = cellOf(name);
  if (!found) throw new Error(name);
  return found;
};
const on = (name: string) => nextCell(columns, cell(name), 'on');
const back = (name: string) => nextCell(columns, cell(name), 'back');

describe('the keys of the entry grid', () => {
  test('go down the column, then to the head of the next, in the order of work', () => {
    expect(cellsInOrder(columns).map(cellName)).toEqual([
      'left 1 0', 'left 1 1', 'left 1 2', 'right 1 0', 'right 1 1', 'right 1 2',
      'left 2 0', 'left 2 1', 'left 2 2', 'right 2 0', 'right 2 1', 'right 2 2', 'left 3 1',
    ]);
    expect(on('left 1 2')).toEqual(cell('right 1 0'));
    expect(on('right 1 2')).toEqual(cell('left 2 0'));
  });

  test('reach the third reading only at the levels that need one', () => {
    expect(on('right 2 2')).toEqual(cell('left 3 1'));
    expect(on('left 3 1')).toBeNull();
    expect(columnsOf(3, { left: [], right: [] })).toHaveLength(4);
  });

  test('go back the same way, and leave the grid at its ends', () => {
    expect(back('right 1 0')).toEqual(cell('left 1 2'));
    expect(back('left 3 1')).toEqual(cell('right 2 2'));
    expect(back('left 1 0')).toBeNull();
    expect(nextCell(columns, { side: 'left', trial: 3, level: 0 }, 'on')).toBeNull();
  });

  test('every step back undoes a step on', () => {
    for (const at of cellsInOrder(columns)) {
      const next = nextCell(columns, at, 'on');
      if (next) expect(nextCell(columns, next, 'back')).toEqual(at);
    }
  });

  test.each([
    ['Enter', false, 'on'],
    ['Enter', true, 'back'],
    ['Tab', false, 'on'],
    ['Tab', true, 'back'],
    ['ArrowDown', false, 'on'],
    ['ArrowUp', false, 'back'],
    ['5', false, null],
    ['ArrowLeft', false, null],
  ])('%s (shift %s) means %s', (key, shiftKey, step) => {
    expect(stepOf({ key, shiftKey })).toBe(step);
  });

  test('names that are no cell are none', () => {
    expect(cellOf('weight')).toBeNull();
    expect(cellOf('left 4 0')).toBeNull();
  });
});

describe('what is typed into the grid', () => {
  const about = { map: { startOffsetMm: 0, stepMm: 40, levelCount: 3 }, method: 'frustum', toleranceMm: 5 };

  test('a decimal comma is a decimal point', () => {
    expect(readCell('23,6')).toEqual({ mm: 236, problem: null });
    expect(readCell(' 23.6 ')).toEqual({ mm: 236, problem: null });
    expect(readCell('')).toEqual({ mm: null, problem: null });
  });

  test('what is no girth is said in words and not read', () => {
    expect(readCell('236')).toMatchObject({ mm: null, problem: expect.stringContaining('23.6') as string });
    expect(readCell('abc').problem).toMatch(/not a number/);
    expect(readCell('9.5').mm).toBeNull();
    expect(readCell('23.65').problem).toMatch(/decimals/);
  });

  test('comes back from the server as it was kept', () => {
    const trials = [{ side: 'left' as const, trial: 1, circumferencesMm: [160, null, 190], savedAt: '2027-03-03T10:00:00Z' }];
    const typed = typedFrom(trials);
    expect(typed).toEqual({ 'left 1 0': '16.0', 'left 1 2': '19.0' });
    expect(columnMm(typed, 'left', 1, 3)).toEqual([160, null, 190]);
  });

  test('calls for a third reading beyond the tolerance, and no sooner', () => {
    const typed = { 'left 1 0': '16.0', 'left 2 0': '16.5', 'left 1 1': '17.2', 'left 2 1': '17.8' };
    const sitting = sittingOf(typed, about);
    expect(thirdLevels(sitting, 'left')).toEqual([1]);
    expect(doubtsOf(sitting, false).map(({ check, place }) => [check, place])).toEqual([['trials.differ', 'left 2 1']]);
  });

  test('while trial 1 is covered the drawing shows nothing of it', () => {
    const sitting = sittingOf({ 'left 1 0': '16.0', 'left 1 1': '17.2', 'left 2 0': '16.2' }, about);
    expect(drawnMm(sitting, 'left', true)).toEqual([162, null, null]);
    expect(drawnMm(sitting, 'left', false)).toEqual([161, 172, null]);
  });
});

describe('a value that is being typed', () => {
  test('is spoken of once it is left, and at once when it is longer than any girth', () => {
    const typed = { 'left 1 0': '160', 'left 1 1': '16.05' };
    expect(isHalfTyped('left 1 0', 'left 1 0', typed)).toBe(true);
    expect(isHalfTyped('left 1 0', null, typed)).toBe(false);
    expect(isHalfTyped('left 1 0', 'left 1 1', typed)).toBe(false);
    expect(isHalfTyped('left 1 1', 'left 1 1', typed)).toBe(false);
  });
});
