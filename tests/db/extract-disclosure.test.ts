import { buffer } from 'node:stream/consumers';
import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { choosePeople } from '@/lib/extracts/choose-people';
import { columnsFor } from '@/lib/extracts/define-extract-file';
import { markedColumns } from '@/lib/extracts/disclosure';
import { downloadFile } from '@/lib/extracts/download-file';
import { participants } from '@/lib/extracts/files/participants';
import type { Profile } from '@/lib/extracts/input';
import { previewExtract } from '@/lib/extracts/preview-extract';
import { readFile } from '@/lib/extracts/read-file';
import { requestExtract } from '@/lib/extracts/request-extract';
import { viewExtract, type ExtractView } from '@/lib/extracts/view-extract';
import { extractPrepare } from '@/lib/jobs/handlers/extract-prepare';
import { storage } from '@/lib/storage';
import { withWork } from '@/lib/work/with-work';
import { givenParticipant, givenScene, givenStaff, jobDeps, setScene, type GivenScene } from '../given';

const many = 36;
let scene: GivenScene;
let fromSurgery: GivenScene;
let investigator: Actor;

type Rows = Record<string, string>[];
/** Reads the CSV as written: no cell holds a line break. */
const parse = (text: string): Rows => {
  const cells = (line: string) => [...line.matchAll(/(?:^|,)(?:"((?:[^"]|"")*)"|([^,]*))/g)].map(([, quoted, plain]) => (quoted ?? plain ?? '').replaceAll('""', '"'));
  const [head = [], ...lines] = text.trimEnd().split('\n').map(cells);
  return lines.map((line) => Object.fromEntries(line.map((cell, index) => [head[index] ?? '', cell])));
};
const count = (values: readonly string[]): Record<string, number> => values.reduce<Record<string, number>>((sum, value) => ({ ...sum, [value]: (sum[value] ?? 0) + 1 }), {});
const smallest = (rows: Rows, columns: readonly string[]): number => Math.min(...Object.values(count(rows.map((row) => JSON.stringify(columns.map((column) => row[column]))))));

async function prepared(profile: Profile): Promise<{ extract: ExtractView; read(name: string): Promise<Rows> }> {
  const asked = await withWork(investigator, 'extract.request', (work) => requestExtract(work, { profile, purpose: 'Does load go with later change?', recipient: 'R-02' }));
  await extractPrepare.run({ extractId: asked.id }, jobDeps(() => Promise.resolve()));
  const extract = await withWork(investigator, 'extract.view', (work) => viewExtract(work, { id: asked.id }));
  const read = async (name: string) => {
    const served = await withWork(investigator, 'extract.download', (work) => downloadFile(work, { id: asked.id, name }));
    return parse((await buffer(await storage().get(served.storageKey))).toString('utf8'));
  };
  return { extract, read };
}

/** What the file would hold if nothing were withheld. */
const unguarded = async (profile: Profile): Promise<Rows> => {
  const rows = await withWork(await systemEverywhere(), 'job.extract', async (work) => readFile(work, participants, profile, (await choosePeople(work)).people));
  return rows.map((row) => Object.fromEntries(columnsFor(participants, profile).map(({ name }) => [name, String(row[name] ?? '')])));
};

beforeAll(async () => {
  scene = await givenScene();
  fromSurgery = await givenScene({ anchor: 'surgery' });
  investigator = await givenStaff('investigator', [scene.site, scene.otherSite, fromSurgery.site, fromSurgery.otherSite]);
  for (let index = 0; index < many; index += 1) {
    const home = index % 9 === 0 ? fromSurgery : scene;
    const { id, siteId } = await givenParticipant(index % 4 === 0 ? home.otherSite : home.site, home.protocol, home.coordinator, {
      affectedSide: index % 2 === 0 ? 'left' : 'right',
      permissions: { 'data-sharing': 'yes', 'future-contact': 'no' },
    });
    await setScene([siteId], async (work) => {
      await work.sql(`select set_config('app.reason', 'Facts of this person', true)`);
      await work.sql(`update participant set age_years = ?, height_mm = ?, surgery_on = '2026-12-01'::date - ?::int, nodes_removed = ?, surgery = ?, axillary_procedure = ?, dominant_side = ? where id = ?`, [
        38 + ((index * 7) % 30), 1550 + ((index * 37) % 250), index * 17, 1 + ((index * 5) % 22), index % 5 === 0 ? 'mastectomy' : 'breast-conserving', index % 3 === 0 ? 'axillary-dissection' : 'sentinel-node-biopsy', index % 7 === 0 ? 'left' : 'right', id,
      ]);
    });
  }
});

describe.each([['open', 11], ['controlled', 5]] as const)('the %s extract', (profile, least) => {
  const marked = markedColumns(profile).map(({ name }) => name);

  test(`as written has no group of fewer than ${least}, though the record has`, async () => {
    const { extract, read } = await prepared(profile);
    const rows = await read('participants.csv');
    expect(rows).toHaveLength(many);
    expect(smallest(await unguarded(profile), marked)).toBe(1);
    expect(smallest(rows, marked)).toBeGreaterThanOrEqual(least);
    expect(extract.disclosure).toMatchObject({ atLeast: least, people: many, smallestGroup: smallest(rows, marked) });
  });

  test('loses nothing but what it says is withheld', async () => {
    const { extract, read } = await prepared(profile);
    const [rows, whole] = [await read('participants.csv'), await unguarded(profile)];
    for (const { name } of columnsFor(participants, profile)) {
      // Drawn anew each time.
      if (name === 'study_number') continue;
      const [before, after] = [count(whole.map((row) => row[name] ?? '')), count(rows.map((row) => row[name] ?? ''))];
      if (!marked.includes(name)) expect(after, name).toEqual(before);
      for (const [value, times] of Object.entries(after)) if (value !== 'withheld' && name !== 'site_number') expect(times, `${name} ${value}`).toBeLessThanOrEqual(before[value] ?? 0);
      const held = whole.filter((row) => row[name] !== '').length - rows.filter((row) => row[name] !== '' && row[name] !== 'withheld').length;
      if (marked.includes(name)) expect(extract.disclosure?.withheld.find(({ column }) => column === name)?.values, name).toBe(held);
    }
    expect(whole.every(({ weeks_since_surgery_band: band = '' }) => /^\d+(-\d+|\+)$/.test(band))).toBe(true);
  });

  test('says so in its codebook, and the page that asks says the same before', async () => {
    const { extract, read } = await prepared(profile);
    const codebook = (await read('codebook.csv')).filter(({ smallest_group: group }) => group !== '');
    expect(codebook.map(({ column }) => column).toSorted()).toEqual(marked.toSorted());
    const preview = await withWork(investigator, 'extract.preview', (work) => previewExtract(work, { profile }));
    // Sites are numbered anew each time, and equal groups are taken in the order of their values.
    if (profile === 'open') expect(preview.disclosure).toEqual(extract.disclosure);
    else expect(preview.disclosure).toMatchObject({ atLeast: least, people: many });
    for (const { column, values } of extract.disclosure?.withheld ?? [])
      expect(codebook.find((row) => row['column'] === column)).toMatchObject({ values_withheld: String(values), smallest_group: String(extract.disclosure?.smallestGroup), people_with_any_withheld: String(extract.disclosure?.peopleWithAny) });
  });

  test('tells no day of surgery, not even by the schedule that counts from it', async () => {
    const { read } = await prepared(profile);
    expect(Object.keys((await read('participants.csv'))[0] ?? {}).filter((name) => name.endsWith('_day'))).toEqual([]);
    const visits = await read('visits.csv');
    const countedFrom = Math.ceil(many / 9);
    for (const name of ['target_day', 'opens_day', 'closes_day']) expect(new Set(visits.filter((row) => row[name] === '').map(({ study_number: person }) => person)).size, name).toBe(countedFrom);
    expect(visits.filter(({ target_day: day }) => day !== '').length).toBeGreaterThan(0);
  });
});
