import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { beginAssessment } from '@/lib/measurement/begin-assessment';
import { completeAssessment } from '@/lib/measurement/complete-assessment';
import { correctValue } from '@/lib/measurement/correct-value';
import type { CorrectValueInput } from '@/lib/measurement/input';
import { saveCircumstances } from '@/lib/measurement/save-circumstances';
import { saveTrial } from '@/lib/measurement/save-trial';
import { viewAssessment } from '@/lib/measurement/view-assessment';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { listQueriesInput } from '@/lib/queries/input';
import { listQueries } from '@/lib/queries/list-queries';
import { raiseQuery } from '@/lib/queries/raise-query';
import { viewQuery, type QueryView } from '@/lib/queries/view-query';
import { queryRaised } from '@/lib/mail/letters/query-raised';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import type { FieldTarget } from '@/lib/queries/targets';
import { asOwner, givenParticipant, givenScene, givenStaff, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let assessor: Actor;
let monitor: Actor;
beforeAll(async () => {
  scene = await givenScene();
  assessor = await givenStaff('assessor', scene.site);
  monitor = await givenStaff('monitor', scene.site);
});

/** The arm of the worked example VOL-03 (clinical checks), and one that is 1.5 cm fuller at every level: plainly the other arm. */
const slim = [160, 172, 190, 212, 234, 251, 260, 264, 270, 282, 296];
const full = slim.map((girth) => girth + 15);
const weeks = { baseline: '2027-01-08', 'week-12': '2027-03-31', 'month-6': '2027-07-07' } as const;
const now = new Date('2027-09-01T10:00:00Z');

interface Reading {
  readonly left?: readonly number[];
  readonly right?: readonly number[];
  readonly kg?: number;
}

/** Both trials of both arms, half a millimetre of nothing between them: the same girths twice. */
async function measure(who: GivenParticipant, key: keyof typeof weeks, { left = full, right = slim, kg = 71.4 }: Reading = {}): Promise<OpenAssessmentView> {
  const at = { now: new Date(`${weeks[key]}T10:00:00Z`) };
  let view = await withWork(assessor, 'assessment.begin', (work) => beginAssessment(work, { id: who.visits[key] ?? '' }), at);
  const about = { id: view.id, position: 'hanging', sleeveWorn: false, hoursSinceTraining: 30, bodyWeightG: Math.round(kg * 1000), impedanceRatio: 1.02, impedanceRestMin: 10, remarks: null };
  view = await withWork(assessor, 'assessment.save-trial', (work) => saveCircumstances(work, about), at);
  for (const trial of [1, 2])
    for (const [side, girths] of [['left', left], ['right', right]] as const)
      view = await withWork(assessor, 'assessment.save-trial', (work) => saveTrial(work, { id: view.id, side, trial, circumferencesMm: [...girths] }), at);
  return view;
}

interface Kept {
  readonly check: string;
  readonly place: string;
  readonly reason: string;
}

const complete = (view: OpenAssessmentView, kept: Kept[] = []): Promise<CompleteAssessmentView> =>
  withWork(assessor, 'assessment.complete', (work) => completeAssessment(work, { id: view.id, kept }), { now });

const refusalOf = (attempt: Promise<unknown>): Promise<Refusal> =>
  attempt.then(
    () => {
      throw new Error('It was saved.');
    },
    (error: unknown) => {
      if (error instanceof Refusal) return error;
      throw error;
    },
  );

/** The doubts a refusal asks about, as 'check place', with all its words. */
const asked = ({ field = '', beside, sentence }: Refusal) => ({
  doubts: [field, ...beside.map((one) => one.field)].map((name) => name.replace(/^keep /, '')),
  words: [sentence, ...beside.map((one) => one.sentence)].join(' '),
});

const enrolled = () => givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-01-06', affectedSide: 'left' });
const little = (girths: readonly number[]) => girths.map((girth, level) => girth + (level % 2));

describe('a second visit is held against the first', () => {
  let who: GivenParticipant;
  beforeAll(async () => {
    who = await enrolled();
    await complete(await measure(who, 'baseline'));
  });

  test('when both trials are in, and never with a figure from before', async () => {
    const other = await enrolled();
    await complete(await measure(other, 'baseline', { kg: 83.7 }));
    const open = await measure(other, 'week-12', { left: slim, right: full, kg: 55.2 });
    const shown = await withWork(assessor, 'assessment.view', (work) => viewAssessment(work, { visitId: open.visitId }));
    expect(JSON.stringify(shown)).not.toMatch(/swap|last visit|baseline/);
    const { doubts, words } = asked(await refusalOf(complete(open)));
    expect(doubts).toEqual(expect.arrayContaining(['arms.swapped whole', 'weight-change.limit weight']));
    expect(words).toContain('55.2 kg today');
    // Neither the weight of the first visit nor how far the arms moved: 1.5 cm.
    expect(words).not.toMatch(/83|84|1\.5|→/);
  });

  test('with left and right exchanged it asks, and is saved once somebody says why', async () => {
    const open = await measure(who, 'week-12', { left: slim, right: full });
    const { doubts } = asked(await refusalOf(complete(open)));
    expect(doubts).toContain('arms.swapped whole');
    const kept = doubts.map((name) => ({ check: name.split(' ')[0] ?? '', place: name.split(' ')[1] ?? '', reason: 'Both arms looked at again.' }));
    const saved = await complete(open, kept);
    expect(saved.findings.map(({ check, reason }) => [check, reason])).toContainEqual(['arms.swapped', 'Both arms looked at again.']);
  });

  test('with every girth copied forward it asks', async () => {
    const other = await enrolled();
    await complete(await measure(other, 'baseline'));
    expect(asked(await refusalOf(complete(await measure(other, 'week-12')))).doubts).toEqual(['arms.copied-forward whole']);
  });

  test('with the weight typed in pounds it asks', async () => {
    const other = await enrolled();
    await complete(await measure(other, 'baseline', { kg: 62 }));
    // 62 kg are 136.7 lb (1 kg = 2.2046 lb): inside the usual range of a weight, so only the last visit tells.
    const open = await measure(other, 'week-12', { left: little(full), right: little(slim), kg: 136.7 });
    expect(asked(await refusalOf(complete(open))).doubts).toEqual(['weight-change.limit weight']);
  });

  test('with the arm of the trial grown by a tenth it asks, and with nothing unusual it asks nothing', async () => {
    const other = await enrolled();
    await complete(await measure(other, 'baseline'));
    // Girths 6 % larger hold about 12 % more: over the 10 % that is asked about.
    const grown = await measure(other, 'week-12', { left: full.map((girth) => Math.round(girth * 1.06)), right: little(slim) });
    expect(asked(await refusalOf(complete(grown))).doubts).toEqual(['at-risk-change.range left']);
    const third = await enrolled();
    await complete(await measure(third, 'baseline'));
    expect((await complete(await measure(third, 'week-12', { left: little(full), right: little(slim), kg: 72 }))).findings).toEqual([]);
  });
});

describe('what cannot be right', () => {
  test('is not saved, whatever reason is given', async () => {
    const who = await enrolled();
    // 52.1 cm at 20 cm above the wrist, over the limit of 50.
    const open = await measure(who, 'baseline', { left: full.with(5, 521) });
    const kept = ['left 1 5', 'left 1 6', 'left 2 5', 'left 2 6'].flatMap((place) => ['girth.limit', 'taper.limit'].map((check) => ({ check, place, reason: 'It is so.' })));
    await expect(complete(open, kept)).rejects.toMatchObject({ code: 'invalid', field: 'left 1 5', sentence: expect.stringContaining('over the limit of 50') as string });
  });

  test('and what is doubtful by itself needs a reason', async () => {
    const who = await enrolled();
    const open = await measure(who, 'baseline', { kg: 171 });
    expect(asked(await refusalOf(complete(open))).doubts).toEqual(['weight.range weight']);
    expect((await complete(open, [{ check: 'weight.range', place: 'weight', reason: 'Weighed twice.' }])).findings).toEqual([
      expect.objectContaining({ check: 'weight.range', reason: 'Weighed twice.' }),
    ]);
  });
});

describe('a correction', () => {
  let who: GivenParticipant;
  let first: CompleteAssessmentView;
  let second: CompleteAssessmentView;
  beforeAll(async () => {
    who = await enrolled();
    first = await complete(await measure(who, 'baseline'));
    second = await complete(await measure(who, 'week-12', { left: little(full), right: little(slim) }));
  });

  const correct = (correction: Omit<CorrectValueInput, 'reason'>, expectedVersion?: number) => {
    const reason = 'Read again from the sheet.';
    return withWork(assessor, 'assessment.correct', (work) => correctValue(work, { ...correction, reason }), { reason, now, ...(expectedVersion === undefined ? {} : { expectedVersion }) });
  };
  const weightOf = ({ id }: { id: string }): FieldTarget => ({ table: 'limb_assessment', id, field: 'body_weight_g' });
  const girthOf = (view: CompleteAssessmentView, level: number): FieldTarget => ({ table: 'limb_trial', id: view.trialIds.find(({ side, trial }) => side === 'left' && trial === 1)?.id ?? '', field: `circumferences_mm.${level}` });
  const again = (view: CompleteAssessmentView) => withWork(assessor, 'assessment.view', (work) => viewAssessment(work, { visitId: view.visitId })) as Promise<CompleteAssessmentView>;

  test('to what cannot be right is refused', async () => {
    await expect(correct({ target: girthOf(second, 5), value: 521, also: { other: 521 } })).rejects.toMatchObject({ code: 'invalid', field: 'value' });
    await expect(correct({ target: weightOf(second), value: 260_000 })).rejects.toThrow(/over 250 kg/);
  });

  test('to what is doubtful needs its reason, which stands on the form', async () => {
    const { doubts } = asked(await refusalOf(correct({ target: weightOf(second), value: 249_000 })));
    expect(doubts).toEqual(['weight.range weight', 'weight-change.limit weight']);
    const kept = doubts.map((name) => ({ check: name.split(' ')[0] ?? '', place: name.split(' ')[1] ?? '', reason: 'The scale was read by two.' }));
    await correct({ target: weightOf(second), value: 249_000, kept });
    expect((await again(second)).findings.map(({ check, reason }) => [check, reason])).toEqual(kept.map(({ check, reason }) => [check, reason]));
    await correct({ target: weightOf(second), value: 72_000 });
    expect((await again(second)).findings).toEqual([]);
  });

  test('of a girth does not ask again why the whole arm is kept, and asks about a doubt that is new', async () => {
    const other = await enrolled();
    await complete(await measure(other, 'baseline'));
    const grown = full.map((girth) => Math.round(girth * 1.06));
    const reason = 'Measured by a second person.';
    const saved = await complete(await measure(other, 'week-12', { left: grown, right: little(slim) }), [{ check: 'at-risk-change.range', place: 'left', reason }]);
    const [before] = saved.findings;
    const value = (grown[5] ?? 0) - 3;
    await correct({ target: girthOf(saved, 5), value, also: { other: value } });
    const [after] = (await again(saved)).findings;
    expect(after).toMatchObject({ check: 'at-risk-change.range', reason });
    expect(after?.message, 'the sentence follows the figure').not.toBe(before?.message);
    expect(asked(await refusalOf(correct({ target: weightOf(saved), value: 171_000 }))).doubts).toContain('weight.range weight');
  });

  test('that casts doubt on another visit raises a query there', async () => {
    // 60 kg at the first visit is nothing by itself; 72 kg at the second is then 20 % more.
    await correct({ target: weightOf(first), value: 60_000 });
    expect((await again(second)).findings.map(({ check, reason }) => [check, reason])).toEqual([['weight-change.range', null]]);
    const { rows } = await withWork(monitor, 'query.list', (work) => listQueries(work, listQueriesInput.parse({ pageSize: 100 })), { now });
    const raised = rows.filter(({ participantCode }) => participantCode === who.code);
    const [letter] = await asOwner<{ letter: unknown }>(`select data -> 'data' as letter from pgboss.job where data::text like '%' || $1 || '%'`, [raised[0]?.id]);
    expect(queryRaised.renderRaw(letter?.letter).text).toMatch(/^An edit check has raised a data query on /);
    expect(raised.map(({ fieldLabel, origin, visitId }) => [fieldLabel, origin, visitId])).toEqual([['Body weight', 'check', second.visitId]]);
  });

  test('of the day keeps to the study: begun visits only, from the enrolment to today', async () => {
    const day = (id: string): FieldTarget => ({ table: 'visit', id, field: 'done_on' });
    await expect(correct({ target: day(who.visits['month-6'] ?? ''), value: '2027-07-01' })).rejects.toMatchObject({ code: 'conflict', field: 'value' });
    await expect(correct({ target: day(second.visitId), value: '1900-01-01' })).rejects.toMatchObject({ code: 'invalid', field: 'value' });
    await expect(correct({ target: day(second.visitId), value: '2027-09-02' })).rejects.toMatchObject({ code: 'invalid', field: 'value' });
    await correct({ target: day(second.visitId), value: '2027-03-30' });
  });

  describe('that answers a query', () => {
    const ask = (target: FieldTarget): Promise<QueryView> => withWork(monitor, 'query.raise', (work) => raiseQuery(work, { target, question: 'What does the sheet say?' }), { now });
    const stateOf = async ({ id }: QueryView): Promise<string> => (await withWork(monitor, 'query.list', (work) => viewQuery(work, id))).state;

    test('answers one about the same value only', async () => {
      const stranger = await enrolled();
      const theirs = await ask(girthOf(await complete(await measure(stranger, 'baseline')), 3));
      const beside = await ask(girthOf(second, 4));
      for (const { id, version } of [theirs, beside]) await expect(correct({ target: girthOf(second, 3), value: 229, query: { id, version } })).rejects.toMatchObject({ code: 'invalid', field: 'query' });
      expect([await stateOf(theirs), await stateOf(beside)]).toEqual(['open', 'open']);
      await correct({ target: girthOf(second, 4), value: 251, query: { id: beside.id, version: beside.version } });
      expect(await stateOf(beside)).toBe('answered');
      await expect(correct({ target: girthOf(second, 4), value: 250, query: { id: beside.id, version: beside.version + 1 } })).rejects.toMatchObject({ code: 'conflict' });
    });

    test('answers it in the version that was read', async () => {
      const query = await ask(girthOf(second, 6));
      await expect(correct({ target: girthOf(second, 6), value: 276, query: { id: query.id, version: query.version + 1 } })).rejects.toMatchObject({ code: 'stale' });
      expect(await stateOf(query)).toBe('open');
    });
  });
});
