import { createHash } from 'node:crypto';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { buffer } from 'node:stream/consumers';
import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { env } from '@/lib/env';
import { codebookOf } from '@/lib/extracts/codebook';
import { dictionary } from '@/lib/extracts/dictionary';
import { downloadFile } from '@/lib/extracts/download-file';
import { extractFiles } from '@/lib/extracts/files';
import type { Profile } from '@/lib/extracts/input';
import { listExtracts } from '@/lib/extracts/list-extracts';
import { prepareExtract } from '@/lib/extracts/prepare-extract';
import { previewExtract } from '@/lib/extracts/preview-extract';
import { requestExtract } from '@/lib/extracts/request-extract';
import { retryExtract } from '@/lib/extracts/retry-extract';
import { viewExtract, type ExtractView } from '@/lib/extracts/view-extract';
import { systemEverywhere } from '@/lib/auth/system-reach';
import { extractPrepare } from '@/lib/jobs/handlers/extract-prepare';
import { storage } from '@/lib/storage';
import type { Storage } from '@/lib/storage/storage';
import { clock } from '@/lib/work/time';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenScene, givenStaff, jobDeps, setScene, type GivenParticipant, type GivenScene } from '../given';

/** A name that a person types where words are allowed, and where a code belongs; it must come out nowhere. */
const typedName = 'Wilhelmina Oxtoby';
const typedMail = 'wilhelmina@home.example';

let scene: GivenScene;
let investigator: Actor;
let sharing: GivenParticipant;
let leaving: GivenParticipant;
let refusing: GivenParticipant;
let notAsked: GivenParticipant;

/** One of everything for a person: two visits measured, a questionnaire, three sessions, a report; with the name in every text. */
async function fillRecord(who: GivenParticipant): Promise<void> {
  const words = `${typedName} ${typedMail}`;
  await setScene([who.siteId], async (work) => {
    for (const [key, on] of [['baseline', '2027-01-08'], ['week-12', '2027-03-31']] as const) {
      const visit = who.visits[key];
      await work.sql(`update visit set state = 'complete', done_on = ? where id = ?`, [on, visit]);
      const [assessment] = await work.sql<{ id: string }>(
        `insert into limb_assessment (site_id, participant_id, visit_id, assessor_id, measured_at, position, sleeve_worn, method, start_offset_mm, step_mm, level_count, tolerance_mm, state, body_weight_g, remarks, left_volume_ml, right_volume_ml, rvc, verdicts, findings, formula_version)
         values (?, ?, ?, ?, ?::timestamptz, ?, false, 'frustum', 0, 40, 3, 5, 'complete', 71400, ?, 2089.1, 2031.2, 0.051, ?::jsonb, ?::jsonb, '1.0.0') returning id`,
        [who.siteId, who.id, visit, scene.coordinator.accountId, `${on}T10:00:00Z`, words, words, JSON.stringify({ D1: { verdict: 'not met', value: 12, unit: 'mm', reason: words }, D5: { verdict: words } }), JSON.stringify([{ reason: words }])],
      );
      for (const side of ['left', 'right'])
        for (const trial of [1, 2])
          await work.sql(`insert into limb_trial (site_id, participant_id, assessment_id, side, trial, circumferences_mm, saved_at) values (?, ?, ?, ?, ?, '{170,180,258}', now())`, [who.siteId, who.id, assessment?.id, side, trial]);
    }
    await work.sql(
      `update questionnaire_response set state = 'submitted', submitted_at = '2027-01-09T10:00:00Z', scores = ?::jsonb, answers = ?::jsonb where participant_id = ? and instrument = 'arm-symptoms' and visit_id = ?`,
      [JSON.stringify({ symptoms: 41.7, [words]: 1 }), JSON.stringify({ ache: 2, heaviness: 'left-out', tightness: words, [words]: 1 }), who.id, who.visits['baseline']],
    );
    for (const on of ['2027-01-10', '2027-01-12', '2027-03-30']) {
      const [session] = await work.sql<{ id: string }>(
        `insert into training_session (site_id, participant_id, local_on, time_zone, entered_at, arm_check, soreness, effort, note, client_key) values (?, ?, ?, 'Europe/London', now(), 'the same', 'no', 4, ?, gen_random_uuid()) returning id`,
        [who.siteId, who.id, on, words],
      );
      await work.sql(
        `insert into training_set (site_id, participant_id, session_id, sequence, exercise, equipment, basis, side, load_typed, unit, load_g, repetitions, set_count) values (?, ?, ?, 1, ?, 'dumbbell', 'per hand', 'both', 2, 'kg', 2000, 10, 3)`,
        [who.siteId, who.id, session?.id, on === '2027-01-12' ? words : 'chest-press'],
      );
    }
    await work.sql(
      `insert into symptom_report (site_id, participant_id, reported_at, noticed_on, answers, level, note, hold_training, state, outcome, review_note, client_key) values (?, ?, '2027-02-01T10:00:00Z', '2027-01-31', ?::jsonb, 'S1', ?, true, 'reviewed', 'advice', ?, gen_random_uuid())`,
      [who.siteId, who.id, JSON.stringify({ signs: ['heavy', words], lastedOverADay: true, soreness: null, [words]: words }), words, words],
    );
  });
}

async function prepared(profile: Profile): Promise<ExtractView> {
  const asked = await withWork(investigator, 'extract.request', (work) => requestExtract(work, { profile, purpose: 'Does load go with later change?', recipient: 'R-02' }));
  await extractPrepare.run({ extractId: asked.id }, jobDeps(() => Promise.resolve()));
  return withWork(investigator, 'extract.view', (work) => viewExtract(work, { id: asked.id }));
}

async function contentOf(extract: ExtractView, name: string): Promise<Buffer> {
  const served = await withWork(investigator, 'extract.download', (work) => downloadFile(work, { id: extract.id, name }));
  return buffer(await storage().get(served.storageKey));
}

/** Reads the simple CSV that we write: no cell holds a line break. */
const rowsOf = (bytes: Buffer): Record<string, string>[] => {
  const [head = '', ...lines] = bytes.toString('utf8').trimEnd().split('\n');
  const cells = (line: string) => [...line.matchAll(/(?:^|,)(?:"((?:[^"]|"")*)"|([^,]*))/g)].map(([, quoted, plain]) => (quoted ?? plain ?? '').replaceAll('""', '"'));
  const names = cells(head);
  return lines.filter((line) => line !== '').map((line) => Object.fromEntries(cells(line).map((cell, index) => [names[index] ?? '', cell])));
};

beforeAll(async () => {
  scene = await givenScene();
  investigator = await givenStaff('investigator', [scene.site, scene.otherSite]);
  const give = (site: GivenScene['site'], permissions: Record<string, 'yes' | 'no'>) => givenParticipant(site, scene.protocol, scene.coordinator, { permissions, enrolledOn: '2027-01-06' });
  sharing = await give(scene.site, { 'data-sharing': 'yes', 'future-contact': 'no' });
  leaving = await give(scene.otherSite, { 'data-sharing': 'yes', 'future-contact': 'no' });
  refusing = await give(scene.site, { 'data-sharing': 'no', 'future-contact': 'yes' });
  notAsked = await give(scene.otherSite, { 'future-contact': 'yes' });
  for (const who of [sharing, leaving, refusing, notAsked]) await fillRecord(who);
  await setScene([leaving.siteId], (work) =>
    work.sql(`update participant set state = 'withdrawn', left_on = '2027-02-10', left_grade = 'no further data', left_reason = ? where id = ?`, [typedName, leaving.id]),
  );
});

describe('the dictionary', () => {
  test('classes every column of the record tables and names none that is not there', async () => {
    const columns = await asOwner<{ table_name: string; column_name: string }>(
      `select table_name, column_name from information_schema.columns where table_schema = 'public' and table_name = any ($1::text[])`,
      [Object.keys(dictionary)],
    );
    const there = columns.map(({ table_name, column_name }) => `${table_name}.${column_name}`).toSorted();
    const classed = Object.entries(dictionary).flatMap(([table, entries]) => Object.keys(entries).map((column) => `${table}.${column}`)).toSorted();
    expect(classed).toEqual(there);
  });

  test('covers every table that hangs on a participant, but those of identity, consent and the margin', async () => {
    const tables = await asOwner<{ table_name: string }>(
      `select table_name from information_schema.columns where table_schema = 'public' and column_name = 'participant_id' order by 1`,
    );
    const elsewhere = ['audit_entry', 'consent', 'consent_signature', 'data_query', 'eligibility_answer', 'invitation', 'participant_identity', 'query_message', 'screening', 'stored_file', 'verification'];
    expect(tables.map(({ table_name }) => table_name).filter((name) => !elsewhere.includes(name))).toEqual(Object.keys(dictionary).toSorted());
  });
});

describe.each(['open', 'controlled'] as const)('a prepared %s extract', (profile) => {
  let extract: ExtractView;
  const bytes = new Map<string, Buffer>();
  const rows = (name: string) => rowsOf(bytes.get(`${name}.csv`) ?? Buffer.from(''));
  beforeAll(async () => {
    extract = await prepared(profile);
    for (const { name } of extract.files) bytes.set(name, await contentOf(extract, name));
  });

  test('is ready with every file, the codebook and the checksums', () => {
    expect(extract).toMatchObject({ state: 'ready', progress: 100, counts: { enrolled: 4, included: 2, saidNo: 1, notAsked: 1, cutShort: 1 } });
    expect([...bytes.keys()].toSorted()).toEqual(
      ['checksums.txt', 'codebook.csv', ...['limb_assessments', 'limb_girths', 'participants', 'questionnaire_items', 'questionnaire_scores', 'symptom_reports', 'training_sessions', 'training_sets', 'visits'].map((name) => `${name}.csv`)].toSorted(),
    );
  });

  test('holds no name, address, code, key of the data base or date in any byte', async () => {
    const secrets = await asOwner<{ text: string }>(`select name as text from participant_identity union select email from participant_identity union select code from participant union select id::text from participant union select name from site`);
    expect(secrets.length).toBeGreaterThan(10);
    for (const [name, content] of bytes) {
      const text = content.toString('utf8');
      for (const secret of [typedName, 'Oxtoby', typedMail, ...secrets.map(({ text: one }) => one)]) expect(text.includes(secret), `${name} holds ${secret}`).toBe(false);
      expect(text, name).not.toMatch(/\d{4}-\d{2}-\d{2}/);
      expect(text, name).not.toMatch(/[\w.]+@[\w.]+/);
      expect(text, name).not.toMatch(/[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}/);
    }
  });

  test('has checksums that another SHA-256 agrees with', () => {
    const lines = (bytes.get('checksums.txt') ?? Buffer.from('')).toString('utf8').trimEnd().split('\n').map((line) => line.split('  '));
    expect(lines).toHaveLength(extractFiles.length + 1);
    for (const [sum, name = ''] of lines) expect(createHash('sha256').update(bytes.get(name) ?? '').digest('hex'), name).toBe(sum);
    for (const { name, byteCount, sha256 } of extract.files) {
      expect(bytes.get(name)?.length).toBe(byteCount);
      expect(createHash('sha256').update(bytes.get(name) ?? '').digest('hex')).toBe(sha256);
    }
  });

  test('counts the rows that the record holds for those who share, until their day', async () => {
    const until = `(p.id = $1 or (p.id = $2 and %on% <= '2027-02-10'))`;
    const count = async (from: string, on: string) => {
      const [row] = await asOwner<{ n: number }>(`select count(*)::int as n from ${from} join participant p on p.id = r.participant_id where ${until.replace('%on%', on)}`, [sharing.id, leaving.id]);
      return row?.n;
    };
    expect(rows('participants')).toHaveLength(2);
    expect(rows('visits')).toHaveLength((await count('visit r', 'coalesce(r.done_on, r.target_on)')) ?? -1);
    expect(rows('limb_assessments')).toHaveLength((await count('limb_assessment r', 'r.measured_at::date')) ?? -1);
    expect(rows('limb_girths')).toHaveLength(3 * 4 * 3);
    expect(rows('training_sessions')).toHaveLength(3 + 2);
    expect(rows('training_sets')).toHaveLength(3 + 2);
    expect(rows('symptom_reports')).toHaveLength(2);
    expect(rows('questionnaire_scores')).toHaveLength(2);
    expect(extract.files.find(({ name }) => name === 'training_sets.csv')?.rowCount).toBe(5);
  });

  test('keeps what was measured, in study days', () => {
    const [assessment] = rows('limb_assessments');
    // Enrolled on 6 January, so that day is day 1 and the 8th is day 3 (SDTM: no day 0).
    expect(assessment).toMatchObject({ measured_day: '3', body_weight_kg: '71.4', left_volume_ml: '2089.1', rvc: '0.051', swelling_d1: 'not met' });
    const [person] = rows('participants');
    // Two people are fewer than either profile asks for: every marked value is withheld; what is not marked stays.
    expect(person).toMatchObject({ weeks_since_surgery_band: 'withheld', age_band: 'withheld', dominant_side: 'withheld', treated_side: 'withheld', cohort: 'at-risk', radiotherapy: 'breast-or-chest-wall' });
    expect(rows('symptom_reports')[0]).toMatchObject({ reported_day: '27', noticed_day: '26', sign_heavy: 'yes', sign_tight: 'no', lasted_over_a_day: 'yes', outcome: 'advice' });
    expect(rows('questionnaire_items').filter(({ item }) => item === 'ache').map(({ answer }) => answer)).toEqual(['2', '2']);
    expect(rows('questionnaire_items').find(({ item }) => item === 'heaviness')).toMatchObject({ answer: '', no_answer: 'left out' });
    expect(rows('limb_girths')[2]).toMatchObject({ level: '3', above_wrist_mm: '80', circumference_mm: '258' });
  });

  test('blanks words typed where a code belongs', () => {
    expect(rows('limb_assessments').map(({ position, swelling_d5 }) => [position, swelling_d5])).toEqual(rows('limb_assessments').map(() => ['', '']));
    expect(rows('training_sets').map(({ exercise }) => exercise).toSorted()).toEqual(['', '', 'chest-press', 'chest-press', 'chest-press']);
    expect(rows('questionnaire_items').find(({ item }) => item === 'tightness')?.answer).toBe('');
  });

  test('has a codebook that covers every column of every file', () => {
    const described = rows('codebook').map(({ file, column }) => `${file} ${column}`);
    const written = extractFiles.flatMap(({ name }) => {
      const [head = ''] = (bytes.get(`${name}.csv`) ?? Buffer.from('')).toString('utf8').split('\n');
      return head.split(',').map((column) => `${name}.csv ${column.replaceAll('"', '')}`);
    });
    expect(described).toEqual(written);
    expect(described).toHaveLength((extract.disclosure ? codebookOf(profile, 'csv', extract.disclosure) : []).length);
  });
});

describe('numbers of people', () => {
  test('differ from one extract to the next and between files they agree', async () => {
    const [first, second] = [await prepared('open'), await prepared('open')];
    const numbers = async (extract: ExtractView, name: string) => [...new Set(rowsOf(await contentOf(extract, name)).map(({ study_number }) => study_number))];
    const people = await numbers(first, 'participants.csv');
    expect(people).toHaveLength(2);
    expect((await numbers(first, 'training_sets.csv')).toSorted()).toEqual(people.toSorted());
    expect(await numbers(second, 'participants.csv')).not.toEqual(expect.arrayContaining(people));
  });
});

describe('preparing', () => {
  const folderOf = (id: string): string[] => {
    const settings = env().STORAGE;
    if (settings.kind !== 'folder') throw new Error('Tests keep files in a folder.');
    return readdirSync(join(settings.path, 'content', 'extracts', id), { recursive: true, withFileTypes: true }).filter((entry) => entry.isFile()).map(({ name }) => name);
  };

  test('a failed attempt keeps nothing and says so; the retry leaves one complete set', async () => {
    const asked = await withWork(investigator, 'extract.request', (work) => requestExtract(work, { profile: 'open', purpose: 'Retry', recipient: 'R-02' }));
    let puts = 0;
    const breaking: Storage = {
      ...storage(),
      put: (key, body, about) => {
        puts += 1;
        return puts === 4 ? Promise.reject(new Error('The disk is full.')) : storage().put(key, body, about);
      },
    };
    const attempt = async (files: Storage, name: string) => prepareExtract({ actor: await systemEverywhere(), extractId: asked.id, attempt: name, storage: files, now: clock });
    await expect(attempt(breaking, 'one')).rejects.toThrow('The disk is full.');
    const failed = await withWork(investigator, 'extract.view', (work) => viewExtract(work, { id: asked.id }));
    expect(failed).toMatchObject({ state: 'failed', files: [] });
    expect(failed.failure).toMatch(/none was kept/);
    expect(folderOf(asked.id)).toEqual([]);
    await expect(withWork(investigator, 'extract.download', (work) => downloadFile(work, { id: asked.id, name: 'visits.csv' }))).rejects.toMatchObject({ code: 'conflict' });
    const again = await withWork(investigator, 'extract.request', (work) => retryExtract(work, { id: asked.id }), { expectedVersion: failed.version });
    expect(again.state).toBe('waiting');
    await attempt(storage(), 'two');
    await attempt(storage(), 'three');
    expect(folderOf(asked.id)).toHaveLength(extractFiles.length + 2);
  });

  test('only a failed extract is tried again', async () => {
    const ready = await prepared('open');
    await expect(withWork(investigator, 'extract.request', (work) => retryExtract(work, { id: ready.id }), { expectedVersion: ready.version })).rejects.toMatchObject({ code: 'conflict' });
  });

  test('a download is written to the trail', async () => {
    const extract = await prepared('open');
    await contentOf(extract, 'visits.csv');
    const events = await asOwner<{ after: { file: string } }>(`select after from audit_entry where act = 'extract.download' and op = 'EVENT' and row_id = $1`, [extract.id]);
    expect(events.map(({ after }) => after.file)).toEqual(['visits.csv']);
    await expect(withWork(investigator, 'extract.download', (work) => downloadFile(work, { id: extract.id, name: 'identity.csv' }))).rejects.toMatchObject({ code: 'not-found' });
  });
});

describe('who may', () => {
  test('monitor, coordinator and participant neither ask, see, preview nor download', async () => {
    const extract = await prepared('open');
    for (const actor of [scene.coordinator, sharing.actor, await givenStaff('monitor', scene.site), await givenStaff('site-investigator', scene.site)]) {
      await expect(withWork(actor, 'extract.request', (work) => requestExtract(work, { profile: 'open', purpose: 'x', recipient: 'x' }))).rejects.toMatchObject({ code: 'forbidden' });
      await expect(withWork(actor, 'extract.list', listExtracts)).rejects.toMatchObject({ code: 'forbidden' });
      await expect(withWork(actor, 'extract.preview', (work) => previewExtract(work, { profile: 'open' }))).rejects.toMatchObject({ code: 'forbidden' });
      await expect(withWork(actor, 'extract.download', (work) => downloadFile(work, { id: extract.id, name: 'visits.csv' }))).rejects.toMatchObject({ code: 'forbidden' });
    }
    const auditor = await givenStaff('auditor', [scene.site, scene.otherSite]);
    expect((await withWork(auditor, 'extract.list', listExtracts)).length).toBeGreaterThan(0);
    await expect(withWork(auditor, 'extract.download', (work) => downloadFile(work, { id: extract.id, name: 'visits.csv' }))).rejects.toMatchObject({ code: 'forbidden' });
  });

  test('the preview counts who would be in it and says what is left out', async () => {
    const preview = await withWork(investigator, 'extract.preview', (work) => previewExtract(work, { profile: 'open' }));
    expect(preview.people).toEqual({ enrolled: 4, included: 2, saidNo: 1, notAsked: 1, cutShort: 1 });
    const note = preview.groups.flatMap(({ rows }) => rows).find(({ key }) => key === 'training_session.note');
    expect(note).toMatchObject({ class: 'free text', treatment: 'left out' });
    expect(preview.groups.flatMap(({ rows }) => rows).find(({ key }) => key === 'participant.site_id')?.treatment).toBe('left out');
  });
});
