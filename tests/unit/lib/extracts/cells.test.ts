import { Readable } from 'node:stream';
import { text } from 'node:stream/consumers';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { cleanCell } from '@/lib/extracts/clean-cell';
import { columnsFor, type ExtractColumn } from '@/lib/extracts/define-extract-file';
import { extractFiles } from '@/lib/extracts/files';
import { csv } from '@/lib/extracts/formats/csv';

const columns = extractFiles.flatMap((file) => [...columnsFor(file, 'open'), ...columnsFor(file, 'controlled')]);
/** Whatever a person can type: formulas, NUL, lone surrogates, line breaks, any UTF-16. */
const typed = fc.oneof(
  fc.constantFrom('=1+1', '+1', '-1+cmd', '@SUM(A1)', '\t=1', '\r=1', 'a\u0000b', '\ud800', '\udfff x', '"', 'a,b', 'a\nb', '=HYPERLINK("x")'),
  fc.string({ unit: 'binary' }),
  fc.array(fc.integer({ min: 0, max: 0xffff }), { maxLength: 12 }).map((units) => String.fromCharCode(...units)),
);

describe('a cell of an extract', () => {
  test('never holds what a person typed, in any column', () => {
    fc.assert(
      fc.property(fc.constantFrom<ExtractColumn>(...columns), typed, (column, value) => {
        const cell = cleanCell(column, value);
        if (column.kind === 'code') expect([null, ...(column.codes ?? [])]).toContain(cell);
        if (cell !== null) expect(String(cell)).toMatch(/^\w[\w .+-]*$/);
      }),
      { numRuns: 2000 },
    );
  });

  test('cannot be read as a formula: no word of a list and no key begins one', () => {
    for (const { codes = [] } of columns) for (const code of codes) expect(code).not.toMatch(/^[=+\-@\t\r]/);
    for (const { kind } of columns.filter((column) => column.kind === 'key')) expect(cleanCell({ name: 'k', label: '', from: [], kind, sql: '' }, '-1')).toBeNull();
  });

  test('makes a file of whole UTF-8 whatever was typed', async () => {
    const column = columns.find(({ kind }) => kind === 'key') as ExtractColumn;
    const rows = ['a\u0000b', '\ud800', '=1+1', 'month-6', 'a\nb'].map((value, place) => ({ place, key: cleanCell(column, value) }));
    expect(await text(Readable.from(rows).pipe(csv.write(['place', 'key'])))).toBe('"place","key"\n0,\n1,\n2,\n3,"month-6"\n4,');
  });
});
