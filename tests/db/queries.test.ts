import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { answerQuery } from '@/lib/queries/answer-query';
import { askAgain } from '@/lib/queries/ask-again';
import { cancelQuery } from '@/lib/queries/cancel-query';
import { closeQueries } from '@/lib/queries/close-queries';
import { closeQuery } from '@/lib/queries/close-query';
import { askAgainInput, listQueriesInput, raiseQueryInput } from '@/lib/queries/input';
import { listQueries } from '@/lib/queries/list-queries';
import { raiseQuery } from '@/lib/queries/raise-query';
import { remind } from '@/lib/queries/remind';
import { queriesOfVisit, type QueryView } from '@/lib/queries/view-query';
import { beginVisit } from '@/lib/schedule/begin-visit';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenScene, givenStaff, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let monitor: Actor;
let who: GivenParticipant;
let visitId: string;
beforeAll(async () => {
  scene = await givenScene();
  monitor = await givenStaff('monitor', [scene.site, scene.otherSite]);
});
beforeEach(async () => {
  who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
  visitId = who.visits['baseline'] ?? '';
  await withWork(scene.coordinator, 'visit.begin', (work) => beginVisit(work, { id: visitId }), { expectedVersion: 1, now: new Date('2027-01-08T10:00:00Z') });
});

const target = () => ({ table: 'visit' as const, id: visitId, field: 'done_on' });
const raise = (question = 'The diary has another day. Which is right?', now?: Date): Promise<QueryView> =>
  withWork(monitor, 'query.raise', (work) => raiseQuery(work, { target: target(), question }), now ? { now } : {});
const answer = (query: QueryView) =>
  withWork(scene.coordinator, 'query.answer', (work) => answerQuery(work, { id: query.id, answer: 'The form is right.' }), { expectedVersion: query.version });
const list = (input: Record<string, unknown> = {}, actor = monitor) => withWork(actor, 'query.list', (work) => listQueries(work, listQueriesInput.parse({ pageSize: 100, ...input })));

describe('a data query', () => {
  test('commits with its question, its trail and a letter that holds no value and no question', async () => {
    const query = await raise();
    expect(query).toMatchObject({ state: 'open', target: { label: 'Date of visit' }, messages: [{ kind: 'question', label: monitor.label }] });
    const trail = await asOwner(`select act from audit_entry where table_name = 'data_query' and row_id = $1`, [query.id]);
    expect(trail).toEqual([{ act: 'query.raise' }]);
    const jobs = await asOwner<{ data: object }>(`select data from pgboss.job where data::text like '%' || $1 || '%'`, [query.id]);
    expect(jobs).toHaveLength(1);
    const letter = JSON.stringify(jobs[0]?.data);
    expect(letter).toContain(who.code);
    expect(letter).not.toContain('diary');
    expect(letter).not.toContain('2027-01');
  });

  test('is closed only once it was answered, by who asked and never by the site', async () => {
    const query = await raise();
    const close = (version: number, actor = monitor) => withWork(actor, 'query.close', (work) => closeQuery(work, { id: query.id }), { expectedVersion: version });
    await expect(close(query.version)).rejects.toMatchObject({ code: 'conflict' });
    const answered = await answer(query);
    expect(answered.state).toBe('answered');
    await expect(close(answered.version, scene.coordinator)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(close(query.version)).rejects.toMatchObject({ code: 'stale' });
    expect((await close(answered.version)).state).toBe('closed');
  });

  test('goes back to the site when the answer leaves something open, and keeps the thread', async () => {
    const answered = await answer(await raise());
    const again = await withWork(monitor, 'query.ask-again', (work) => askAgain(work, { id: answered.id, question: 'Which page of the diary?' }), { expectedVersion: answered.version });
    expect(again).toMatchObject({ state: 'open' });
    expect(again.messages.map(({ kind }) => kind)).toEqual(['question', 'answer', 'ask again']);
  });

  test('is withdrawn with a reason, and is then no longer to be answered', async () => {
    const query = await raise();
    const gone = await withWork(monitor, 'query.cancel', (work) => cancelQuery(work, { id: query.id, reason: 'Asked twice.' }), { expectedVersion: query.version });
    expect(gone).toMatchObject({ state: 'cancelled' });
    expect(gone.messages.at(-1)).toMatchObject({ kind: 'cancel', text: 'Asked twice.' });
    await expect(answer(gone)).rejects.toMatchObject({ code: 'conflict' });
  });

  test('brings one letter a day however often a reminder is pressed', async () => {
    let query = await raise();
    for (let press = 0; press < 3; press += 1) {
      const seen = query;
      query = await withWork(monitor, 'query.remind', (work) => remind(work, { id: seen.id }), { expectedVersion: seen.version });
    }
    const jobs = await asOwner(`select id from pgboss.job where data::text like '%' || $1 || '%'`, [query.id]);
    expect(jobs).toHaveLength(2);
  });

  test('does not exist for another site, for a participant, or about a row out of reach', async () => {
    const query = await raise();
    await expect(
      withWork(scene.otherCoordinator, 'query.answer', (work) => answerQuery(work, { id: query.id, answer: 'Ours?' }), { expectedVersion: query.version }),
    ).rejects.toMatchObject({ code: 'not-found' });
    await expect(list({}, who.actor)).rejects.toMatchObject({ code: 'forbidden' });
    const seen = await withWork(who.actor, 'week.view', (work) => queriesOfVisit(work, visitId));
    expect(seen).toEqual([]);
    const elsewhere = await givenStaff('monitor', scene.otherSite);
    await expect(withWork(elsewhere, 'query.raise', (work) => raiseQuery(work, { target: target(), question: 'What is this?' }))).rejects.toMatchObject({ code: 'not-found' });
    await expect(withWork(monitor, 'query.raise', (work) => raiseQuery(work, { target: { ...target(), field: 'site_id' }, question: 'What is this?' }))).rejects.toMatchObject({ code: 'not-found' });
  });

  test('asks about a column of the record, never about what every object has', async () => {
    const about = (table: 'participant' | 'visit', id: string, field: string) =>
      withWork(monitor, 'query.raise', (work) => raiseQuery(work, { target: { table, id, field }, question: 'What does the chart say?' }));
    for (const field of ['constructor', 'to_string', '__proto__', 'hasOwnProperty', 'valueOf']) {
      await expect(about('participant', who.id, field)).rejects.toMatchObject({ code: 'not-found' });
      await expect(about('visit', visitId, field)).rejects.toMatchObject({ code: 'not-found' });
    }
    const [response] = await asOwner<{ id: string }>('select id from questionnaire_response where participant_id = $1 limit 1', [who.id]);
    for (const field of ['answers.constructor', 'answers.toString'])
      await expect(withWork(monitor, 'query.raise', (work) => raiseQuery(work, { target: { table: 'questionnaire_response', id: response?.id ?? '', field }, question: 'Why?' }))).rejects.toMatchObject({ code: 'not-found' });
    expect((await about('participant', who.id, 'surgery_on')).target.label).toBe('Date of surgery');
  });

  test('asks, and never names the value it expects', () => {
    const parse = (question: string) => raiseQueryInput.safeParse({ target: { table: 'visit', id: randomUUID(), field: 'done_on' }, question });
    expect(parse('Should this be corrected to 71.4?').success).toBe(false);
    for (const leading of ['This should read 70.0 kg.', 'Should it not be 25.4?', 'The girth must be 25.4 cm', 'Was it meant to say 24?', 'Did you mean 71.4?', 'Please enter 71.4.', 'Please change it to about 70']) expect([leading, parse(leading).success]).toEqual([leading, false]);
    for (const open of ['The worksheet shows 25.4 here. Please look again.', 'Was 71.4 kg read with shoes?', 'Should the arm be measured again?', 'Which of the 2 sheets is right?']) expect([open, parse(open).success]).toEqual([open, true]);
    expect(askAgainInput.safeParse({ id: randomUUID(), question: 'It should be 70.' }).success).toBe(false);
    expect(parse('   ').success).toBe(false);
    expect(parse('What does the scale sheet say?').success).toBe(true);
  });
});

describe('the list of queries', () => {
  test('pages, sorts and filters on the server, and says how old each is', async () => {
    const old = await raise('First asked?', new Date('2027-01-02T09:00:00Z'));
    const newer = await raise('Then asked?', new Date('2027-02-02T09:00:00Z'));
    const now = new Date('2027-02-10T10:00:00Z');
    const at = (input: Record<string, unknown>) =>
      withWork(monitor, 'query.list', (work) => listQueries(work, listQueriesInput.parse({ pageSize: 100, siteId: scene.site.id, ...input })), { now });
    const aged = await at({ olderThanDays: 30 });
    expect(aged.rows.map(({ id }) => id)).toContain(old.id);
    expect(aged.rows.map(({ id }) => id)).not.toContain(newer.id);
    expect(aged.rows.find(({ id }) => id === old.id)).toMatchObject({ ageDays: 39, question: 'First asked?', participantCode: who.code });
    const byNumber = await at({ sort: 'number', direction: 'desc' });
    expect(byNumber.rows.map(({ number }) => number)).toEqual(byNumber.rows.map(({ number }) => number).toSorted((a, b) => b - a));
    const page = await at({ sort: 'number', pageSize: 5, page: 0 });
    expect(page.rows.length).toBeLessThanOrEqual(5);
    expect(page.rowCount).toBe(byNumber.rows.length);
    expect((await at({ siteId: scene.otherSite.id })).rows).toEqual([]);
  });

  test('shows the question that is asked now beside the last answer', async () => {
    const answered = await answer(await raise());
    const [row] = (await list({ states: 'answered' })).rows.filter(({ id }) => id === answered.id);
    expect(row).toMatchObject({ question: 'The diary has another day. Which is right?', lastKind: 'answer', lastText: 'The form is right.', lastLabel: scene.coordinator.label });
  });

  test('closes several for one reason, all of them or none', async () => {
    const [first, second, open] = [await answer(await raise()), await answer(await raise()), await raise()];
    const close = (ids: string[]) => withWork(monitor, 'query.close', (work) => closeQueries(work, { ids, reason: 'Value agrees with the source' }));
    await expect(close([first.id, open.id])).rejects.toMatchObject({ code: 'conflict' });
    expect((await list({ states: 'answered' })).rows.map(({ id }) => id)).toContain(first.id);
    expect(await close([first.id, second.id])).toEqual({ closed: 2 });
    expect((await list({ states: 'closed' })).rows.map(({ id }) => id)).toEqual(expect.arrayContaining([first.id, second.id]));
    await expect(withWork(scene.coordinator, 'query.close', (work) => closeQueries(work, { ids: [open.id], reason: 'Ours' }))).rejects.toMatchObject({ code: 'forbidden' });
  });

  test('counts per site what waits and how long', async () => {
    const now = new Date('2027-03-01T10:00:00Z');
    const at = (input: Record<string, unknown>) => withWork(monitor, 'query.list', (work) => listQueries(work, listQueriesInput.parse({ pageSize: 100, ...input })), { now });
    const { sites } = await at({});
    expect(sites.map(({ siteId }) => siteId).toSorted()).toEqual([scene.site.id, scene.otherSite.id].toSorted());
    const ours = sites.find(({ siteId }) => siteId === scene.site.id);
    expect(ours?.open).toBe((await at({ states: 'open', siteId: scene.site.id })).rowCount);
    expect(sites.find(({ siteId }) => siteId === scene.otherSite.id)).toMatchObject({ open: 0, answered: 0, openAges: [] });
  });
});
