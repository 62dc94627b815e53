import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { columnsFor } from '@/lib/extracts/define-extract-file';
import { entryOf } from '@/lib/extracts/dictionary';
import { markedColumns } from '@/lib/extracts/disclosure';
import { participants } from '@/lib/extracts/files/participants';
import { profiles } from '@/lib/extracts/input';
import { WITHHELD, withhold } from '@/lib/extracts/withhold';

const columns = ['a', 'b', 'c'];
type Row = { id: number; other: string; a: string | null; b: string | null; c: string | null };
const cell = fc.constantFrom('x', 'y', 'z', null);
const table = fc
  .array(fc.record({ a: cell, b: cell, c: cell, other: fc.constantFrom('p', 'q') }), { maxLength: 40 })
  .map((rows) => rows.map((row, id): Row => ({ id, ...row })));
const k = fc.integer({ min: 1, max: 6 });

/** Slow twin: for each row, how many rows agree with it cell by cell. */
const smallestOf = (rows: readonly Record<string, unknown>[]): number =>
  rows.length === 0 ? 0 : Math.min(...rows.map((row) => rows.filter((other) => columns.every((column) => row[column] === other[column])).length));

describe('withholding', () => {
  test('by hand: the least important column goes first, and only where the group is too small', () => {
    const rows = [
      ...[1, 2, 3].map((id) => ({ id, a: 'x', b: 'x', c: 'x' })),
      { id: 4, a: 'y', b: 'y', c: 'y' },
      { id: 5, a: 'z', b: 'y', c: 'y' },
      { id: 6, a: 'z', b: 'z', c: 'z' },
    ];
    const { rows: out, report } = withhold(rows, columns, 2);
    // 4 and 5 share b and c once a is withheld; 6 stands alone to the end, so the smallest group (4 and 5) joins it.
    expect(out.map(({ a, b, c }) => [a, b, c])).toEqual([...[1, 2, 3].map(() => ['x', 'x', 'x']), ...[4, 5, 6].map(() => [WITHHELD, WITHHELD, WITHHELD])]);
    expect(report).toEqual({ smallestGroup: 3, withheld: { a: 3, b: 3, c: 3 }, rowsWithAny: 3 });
    expect(withhold(rows.slice(0, 5), columns, 2)).toMatchObject({ report: { smallestGroup: 2, withheld: { a: 2, b: 0, c: 0 }, rowsWithAny: 2 } });
  });

  test('leaves every group with k or more, or everything withheld where there are fewer than k', () => {
    fc.assert(
      fc.property(table, k, (rows, least) => {
        const { rows: out, report } = withhold(rows, columns, least);
        expect(report.smallestGroup).toBe(smallestOf(out));
        if (rows.length >= least) expect(smallestOf(out)).toBeGreaterThanOrEqual(Math.min(least, rows.length));
        else expect(out.every((row) => columns.every((column) => row[column] === WITHHELD))).toBe(true);
      }),
    );
  });

  test('changes nothing but the cells it withholds, and counts those', () => {
    fc.assert(
      fc.property(table, k, (rows, least) => {
        const { rows: out, report } = withhold(rows, columns, least);
        expect(out).toHaveLength(rows.length);
        for (const [index, row] of rows.entries()) for (const [name, value] of Object.entries(row)) if (out[index]?.[name] !== WITHHELD) expect(out[index]?.[name]).toBe(value);
        expect(out.map(({ id, other }) => [id, other])).toEqual(rows.map(({ id, other }) => [id, other]));
        const lost = (column: 'a' | 'b' | 'c') => rows.filter((row, index) => row[column] !== null && out[index]?.[column] === WITHHELD).length;
        expect(report.withheld).toEqual({ a: lost('a'), b: lost('b'), c: lost('c') });
      }),
    );
  });

  test('does not depend on the order of the rows', () => {
    fc.assert(
      fc.property(table.chain((rows) => fc.tuple(fc.constant(rows), fc.shuffledSubarray(rows, { minLength: rows.length }))), k, ([rows, shuffled], least) => {
        const sorted = (list: readonly Row[]) => withhold(list, columns, least).rows.toSorted((a, b) => Number(a['id']) - Number(b['id']));
        expect(sorted(shuffled)).toEqual(sorted(rows));
      }),
    );
  });
});

describe('marked columns', () => {
  test.each(profiles)('of the %s profile are those that the dictionary classes as pointing at a person with others', (profile) => {
    const classed = columnsFor(participants, profile)
      .filter(({ from }) => from.some((source) => entryOf(...(source.split('.') as [string, string]))?.class === 'quasi'))
      .map(({ name }) => name);
    expect(markedColumns(profile).map(({ name }) => name).toSorted()).toEqual(classed.toSorted());
    expect(classed).toContain('weeks_since_surgery_band');
  });

  test('are lists of words, never an exact day', () => {
    for (const profile of profiles) for (const { kind, unit } of columnsFor(participants, profile)) expect([kind, unit ?? '']).not.toContain('study day');
    for (const { codes = [] } of markedColumns('open')) expect(codes).not.toContain(WITHHELD);
  });
});
