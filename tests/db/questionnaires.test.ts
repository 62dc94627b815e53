import { beforeAll, describe, expect, test } from 'vitest';
import { systemActor, type Actor } from '@/lib/auth/roles';
import { listQuestionnaires } from '@/lib/questionnaires/list-questionnaires';
import { markMissed } from '@/lib/questionnaires/mark-missed';
import { saveAnswers } from '@/lib/questionnaires/save-answers';
import { submitAnswers } from '@/lib/questionnaires/submit-answers';
import { viewQuestionnaire } from '@/lib/questionnaires/view-questionnaire';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenScene, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
beforeAll(async () => {
  scene = await givenScene();
});

// Baseline of the small protocol: open from enrolment (6 January) to 3 February 2027.
const at = (day: string) => ({ now: new Date(`${day}T10:00:00Z`) });
const person = () => givenParticipant(scene.site, scene.protocol, scene.coordinator);
const idOf = async ({ id }: GivenParticipant, instrument = 'arm-symptoms') =>
  (await asOwner<{ id: string }>(`select id from questionnaire_response where participant_id = $1 and instrument = $2 order by due_on limit 1`, [id, instrument]))[0]?.id ?? '';
type Given = Record<string, number | string>;
const save = (actor: Actor, id: string, answers: Given, { page = 1, day = '2027-01-10', version }: { page?: number; day?: string; version?: number } = {}) =>
  withWork(actor, 'questionnaire.save', (work) => saveAnswers(work, { id, answers, page }), { ...at(day), ...(version === undefined ? {} : { expectedVersion: version }) });
const submit = (actor: Actor, id: string, answers: Given, day = '2027-01-10') => withWork(actor, 'questionnaire.submit', (work) => submitAnswers(work, { id, answers }), at(day));
const kept = async (id: string) =>
  (await asOwner<{ state: string; answers: Given; left_out: string[]; scores: Record<string, number | null> }>('select state, answers, left_out, scores from questionnaire_response where id = $1', [id]))[0];

const half: Given = { swelling: 1, heaviness: 2, tightness: 'left-out', ache: 0 };
const whole: Given = { swelling: 0, heaviness: 0, tightness: 0, ache: 0, numbness: 0, stiffness: 0, warmth: 0, tiredness: 0 };

describe('answers so far', () => {
  test('are kept page by page and gone on with elsewhere; left out is told apart from not reached', async () => {
    const participant = await person();
    const id = await idOf(participant);
    await save(participant.actor, id, half, { page: 4 });
    expect(await withWork(participant.actor, 'questionnaire.view', (work) => viewQuestionnaire(work, { id }), at('2027-01-11'))).toMatchObject({ answers: half, page: 4, state: 'in progress', isOpen: true });
    expect(await kept(id)).toMatchObject({ left_out: ['tightness'] });
    // The ninth question opens on an answer that was not given: eight are asked, and one of those in `half` is left out.
    const { open } = await withWork(participant.actor, 'questionnaire.list', listQuestionnaires, at('2027-01-11'));
    expect(open.find((row) => row.id === id)).toMatchObject({ itemCount: 8, doneCount: Object.keys(half).length });
  });

  test('sent again after a lost reply are no change; from an older version they are refused', async () => {
    const participant = await person();
    const id = await idOf(participant);
    const first = await save(participant.actor, id, { swelling: 1 }, { version: 1 });
    expect(await save(participant.actor, id, { swelling: 1 }, { version: 1 })).toEqual(first);
    await expect(save(participant.actor, id, { swelling: 2 }, { version: 1 })).rejects.toMatchObject({ code: 'stale' });
    expect(await save(participant.actor, id, { swelling: 2 }, { version: first.version })).toMatchObject({ answers: { swelling: 2 } });
  });

  test.each([
    ['a question that is not there', { sleep: 1 }],
    ['a value outside the list', { swelling: 9 }],
    ['a word that was not offered', { swelling: 'lots' }],
  ])('with %s are refused, saved or submitted', async (_what, answers) => {
    const participant = await person();
    const id = await idOf(participant);
    await expect(save(participant.actor, id, answers)).rejects.toMatchObject({ code: 'invalid' });
    await expect(submit(participant.actor, id, answers)).rejects.toMatchObject({ code: 'invalid' });
    expect(await kept(id)).toMatchObject({ state: 'due', answers: {} });
  });

  test('belong to one participant: another’s is not there, and no role of the site may answer', async () => {
    const id = await idOf(await person());
    await expect(save((await person()).actor, id, half)).rejects.toMatchObject({ code: 'not-found' });
    await expect(save(scene.coordinator, id, half)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(submit(scene.coordinator, id, half)).rejects.toMatchObject({ code: 'forbidden' });
  });
});

describe('the window', () => {
  test('is open from its first day to its last and shut on either side', async () => {
    const participant = await person();
    const id = await idOf(participant);
    await expect(save(participant.actor, id, half, { day: '2027-01-05' })).rejects.toMatchObject({ code: 'conflict' });
    await save(participant.actor, id, half, { day: '2027-01-06' });
    await save(participant.actor, id, { ...half, ache: 1 }, { day: '2027-02-03' });
    await expect(save(participant.actor, id, half, { day: '2027-02-04' })).rejects.toMatchObject({ code: 'expired', message: expect.stringContaining('closed on') as string });
    await expect(submit(participant.actor, id, half, '2027-02-04')).rejects.toMatchObject({ code: 'expired' });
  });

  test('a submission after the due day is late and taken', async () => {
    const participant = await person();
    expect(await submit(participant.actor, await idOf(participant), whole, '2027-01-06')).toMatchObject({ isLate: false });
    expect(await submit(participant.actor, await idOf(participant, 'daily-tasks'), { shelf: 1 }, '2027-01-07')).toMatchObject({ isLate: true });
  });

  test('lists what is open, what comes and what is past', async () => {
    const participant = await person();
    await submit(participant.actor, await idOf(participant), whole);
    const list = await withWork(participant.actor, 'questionnaire.list', listQuestionnaires, at('2027-01-10'));
    expect([list.open.map(({ title }) => title), list.soon.map(({ title }) => title), list.past.map(({ state }) => state)]).toEqual([
      ['Daily life', 'Lifting: trust and worry'],
      ['How your arm feels'],
      ['submitted'],
    ]);
  });
});

describe('submitting', () => {
  // (sum of answered / count) / 3 × 100 with at least half answered: checks PRO-01 to PRO-08, EORTC scoring manual 2001 (from memory).
  test('scores with the half rule: four of eight answered score, three do not', async () => {
    const participant = await person();
    const id = await idOf(participant);
    await submit(participant.actor, id, { swelling: 1, heaviness: 2, tightness: 3, ache: 0, numbness: 'left-out' });
    expect((await kept(id))?.scores).toEqual({ symptoms: 50 });
    const other = await person();
    const otherId = await idOf(other);
    await submit(other.actor, otherId, { swelling: 1, heaviness: 2, tightness: 3 });
    expect((await kept(otherId))?.scores).toEqual({ symptoms: null });
  });

  test('drops the answer to a question that ended up hidden', async () => {
    const participant = await person();
    const id = await idOf(participant);
    await submit(participant.actor, id, { ...whole, bother: 3 });
    expect((await kept(id))?.answers).toEqual(whole);
  });

  test('pressed twice is one submission; afterwards nothing changes it', async () => {
    const participant = await person();
    const id = await idOf(participant);
    const first = await submit(participant.actor, id, whole);
    expect(await submit(participant.actor, id, whole)).toEqual(first);
    await expect(submit(participant.actor, id, { ...whole, ache: 2 })).rejects.toMatchObject({ code: 'locked' });
    await expect(save(participant.actor, id, { ...whole, ache: 2 })).rejects.toMatchObject({ code: 'locked' });
    await expect(asOwner(`update questionnaire_response set answers = '{"ache": 2}' where id = $1`, [id])).rejects.toMatchObject({ code: 'TM003' });
  });

  test('nothing at all is refused', async () => {
    const participant = await person();
    await expect(submit(participant.actor, await idOf(participant), {})).rejects.toMatchObject({ code: 'invalid' });
  });

  test('says at once what must not wait for the site', async () => {
    const participant = await person();
    const { alerts } = await submit(participant.actor, await idOf(participant), { ...whole, warmth: 1 });
    expect(alerts).toMatchObject([{ item: 'warmth', title: 'Get medical care today' }]);
  });
});

describe('a window that has closed', () => {
  test('leaves what was unsent as missed, keeps its answers, and by the clock of the site', async () => {
    const someone = await person();
    const id = await idOf(someone);
    await save(someone.actor, id, half);
    const run = (moment: string) => withWork(systemActor([scene.site.id]), 'job.mark-missed', markMissed, { now: new Date(moment) });
    // Closes on 3 February: it is open until that day ends at the site, whose clock is London's.
    await run('2027-02-03T23:30:00Z');
    expect((await kept(id))?.state).toBe('in progress');
    await run('2027-02-04T00:30:00Z');
    expect(await kept(id)).toMatchObject({ state: 'missed', answers: half });
    expect((await run('2027-02-04T01:30:00Z')).missed).toBe(0);
  });

  test('does not touch what was sent', async () => {
    const someone = await person();
    const id = await idOf(someone);
    await submit(someone.actor, id, whole);
    await withWork(systemActor([scene.site.id]), 'job.mark-missed', markMissed, { now: new Date('2027-02-10T12:00:00Z') });
    expect((await kept(id))?.state).toBe('submitted');
  });
});
