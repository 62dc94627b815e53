import { Readable } from 'node:stream';
import { text } from 'node:stream/consumers';
import { describe, expect, test } from 'vitest';
import { cleanCell } from '@/lib/extracts/clean-cell';
import { bandCodes, code, columnsFor, defineExtractFile, integer, key, yesOrNo } from '@/lib/extracts/define-extract-file';
import { dictionary, mayLeave, type Entry } from '@/lib/extracts/dictionary';
import { extractFiles } from '@/lib/extracts/files';
import { extractFormats } from '@/lib/extracts/formats';
import { profiles } from '@/lib/extracts/input';
import { bindPeople, statementOf } from '@/lib/extracts/read-file';

const file = (from: string) => () =>
  defineExtractFile({ name: 'tried', about: 'Tried', table: 'visit', on: 'r.done_on', order: 'r.id', columns: [key('tried', { label: 'Tried', from })] });

describe('a file of an extract', () => {
  test.each(['participant.left_reason', 'training_session.note', 'visit.missed_reason', 'limb_assessment.assessor_id', 'participant.number', 'visit.brand_new', 'participant_identity.name'])(
    'cannot be built from %s',
    (source) => expect(file(source)).toThrow(RangeError),
  );

  test('cannot tell the site under the open profile', () => {
    expect(file('participant.site_id')).toThrow(/\(open\)/);
    expect(mayLeave('participant.site_id', 'controlled')).toBe(true);
  });

  test('comes from classed columns only, for every file there is', () => {
    expect(extractFiles.map(({ name }) => name)).toEqual(extractFiles.map(({ name }) => name).toSorted());
    for (const one of extractFiles)
      for (const profile of profiles)
        for (const { from } of columnsFor(one, profile)) for (const source of from) expect(mayLeave(source, profile), `${one.name} ${source}`).toBe(true);
  });

  test('names no column of free text in its statement, but to ask whether there is one', () => {
    const freeText = Object.values(dictionary as Record<string, Record<string, Entry>>).flatMap((columns) => Object.entries(columns).filter(([, entry]) => entry.class === 'free text').map(([name]) => name));
    expect(freeText).toContain('remarks');
    for (const one of extractFiles)
      for (const profile of profiles) {
        const statement = statementOf(one, profile).replaceAll('r.unscheduled_reason is not null', '');
        for (const name of freeText) expect(statement, `${one.name} ${name}`).not.toMatch(new RegExp(`\\b${name}\\b`));
      }
  });

  test('binds people as lists the data base reads', () => {
    expect(bindPeople([{ participantId: 'a', studyNumber: 'P0000001', siteNumber: 2, until: null }, { participantId: 'b', studyNumber: 'P0000002', siteNumber: 1, until: '2027-02-10' }])).toEqual(['{a,b}', '{P0000001,P0000002}', '{2,1}', '{NULL,2027-02-10}']);
  });
});

describe('a cell', () => {
  const sides = code('side', ['left', 'right'], { label: 'Side', from: 'limb_trial.side' });
  const count = integer('trial', { label: 'Trial', from: 'limb_trial.trial' });
  const worn = yesOrNo('sleeve_worn', { label: 'Sleeve', from: 'limb_assessment.sleeve_worn' });
  const visit = key('visit', { label: 'Visit', from: 'visit.key' });
  test.each([
    [sides, 'left', 'left'],
    [sides, 'Wilhelmina', null],
    [sides, '=1+1', null],
    [count, 2, 2],
    [count, 2.5, null],
    [count, '2', null],
    [count, Number.NaN, null],
    [worn, true, 'yes'],
    [worn, 'true', null],
    [visit, 'month-6', 'month-6'],
    [visit, 'Wilhelmina Oxtoby', null],
    [visit, 'a@b.example', null],
    [visit, undefined, null],
  ] as const)('of %o holds %o as %o', (column, value, kept) => expect(cleanCell(column, value)).toBe(kept));
});

test('bands cover every age once and pool from 90', () => {
  expect(bandCodes(10, 10, 90)).toEqual(['10-19', '20-29', '30-39', '40-49', '50-59', '60-69', '70-79', '80-89', '90+']);
  expect(bandCodes(80, 5, 90)).toEqual(['80-84', '85-89', '90+']);
});

describe.each(extractFormats)('format $key', ({ write }) => {
  test('gives back as many rows as it took, with its head, quotes doubled and nothing for null', async () => {
    const rows = [{ a: 1, b: 'x, "y"' }, { a: -2.5, b: null }];
    expect(await text(Readable.from(rows).pipe(write(['a', 'b'])))).toBe('"a","b"\n1,"x, ""y"""\n-2.5,');
  });

  test('writes the head when there is no row', async () => {
    expect((await text(Readable.from([]).pipe(write(['a', 'b'])))).trimEnd()).toBe('"a","b"');
  });
});
