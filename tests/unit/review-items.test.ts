import { describe, expect, test } from 'vitest';
import { anchorOf, countSeen, itemLike, keyOfPlace, keyOfTarget, partsOfReview, printValue } from '@/components/margin/review-items';
import { reviewKeyOf } from '@/components/margin/review-keys';
import { keyAtFragment } from '@/components/margin/find-value';
import { doubtsBeside, readCircumstances, typedCircumstances } from '@/components/measurement/beside-tape';
import { saveCircumstancesInput } from '@/lib/measurement/input';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { ReviewView } from '@/lib/review/view-review';

const circumstances = { position: 'hanging', sleeveWorn: false, hoursSinceTraining: 26, bodyWeightG: 71_400, impedanceRatio: 1.04, impedanceRestMin: 10, remarks: null };
const trial = (id: string, side: 'left' | 'right', number: number, circumferencesMm: (number | null)[]) => ({ id, side, trial: number, circumferencesMm, version: 3, savedAt: '' });
const passes = [trial('l1', 'left', 1, [161, 176]), trial('l2', 'left', 2, [159, 190]), trial('r1', 'right', 1, [160, 174]), trial('r2', 'right', 2, [160, 176]), trial('l3', 'left', 3, [null, 189])];
const assessment = {
  id: 'a1',
  version: 7,
  map: { startOffsetMm: 0, stepMm: 40, levelCount: 2 },
  circumstances,
  trials: passes,
  trialIds: passes,
} as unknown as CompleteAssessmentView;
const visit = { id: 'v1', doneOn: '2026-12-03', version: 2 } as ReviewView['visit'];
const parts = partsOfReview({ visit, assessment });
const rows = parts.flatMap((part) => part.rows);

describe('the form of a visit', () => {
  test('lists its lines in the order of work, a third reading only where it was taken', () => {
    expect(parts.map(({ title }) => title)).toEqual(['Before measuring', 'Tape, girths in cm', 'Bioimpedance', 'In words']);
    const [wrist, next] = parts[1]?.rows ?? [];
    expect(wrist?.items.map(({ label }) => label)).toEqual(['Left arm at 0 cm, trial 1', 'Left arm at 0 cm, trial 2', 'Right arm at 0 cm, trial 1', 'Right arm at 0 cm, trial 2']);
    expect(next?.items).toHaveLength(5);
  });

  test('prints each value with its unit, and says what was not recorded', () => {
    expect(printValue('weight', 71_400)).toBe('71.4 kg');
    expect(printValue('girth', 259)).toBe('25.9 cm');
    expect(printValue('worn', false)).toBe('Not worn');
    expect(printValue('date', '2026-12-03')).toBe('3 Dec 2026');
    expect(printValue('words', null)).toBe('not recorded');
  });

  test('a line of the tape counts as seen once every reading in it was', () => {
    const keys = (id: string, level: number) => keyOfTarget({ table: 'limb_trial', id, field: `circumferences_mm.${level}` });
    const four = ['l1', 'l2', 'r1', 'r2'].map((id) => keys(id, 1));
    expect(countSeen(parts, new Set(four)).seen).toBe(0);
    expect(countSeen(parts, new Set([...four, keys('l3', 1)]))).toEqual({ seen: 1, of: rows.length });
  });

  test('a finding stands beside the value it is about', () => {
    expect(keyOfPlace('right 2 1', assessment)).toBe('limb_trial r2 circumferences_mm.1');
    expect(keyOfPlace('weight', assessment)).toBe('limb_assessment a1 body_weight_g');
    expect(keyOfPlace('whole', assessment)).toBe('limb_trial l1 circumferences_mm.0');
    const all = new Set(rows.flatMap(({ items }) => items.map(({ key }) => key)));
    for (const place of ['left 3 1', 'weight', 'ratio', 'whole', 'left']) expect(all).toContain(keyOfPlace(place, assessment));
  });

  test('holds only the date of a visit at which nothing was measured', () => {
    expect(partsOfReview({ visit, assessment: null }).flatMap((part) => part.rows.map(({ label }) => label))).toEqual(['Date of visit']);
    expect(partsOfReview({ visit: { ...visit, doneOn: null }, assessment: null })).toEqual([]);
  });
});

describe('the way to a value', () => {
  const items = rows.flatMap((row) => row.items);
  const right = items.find(({ label }) => label === 'Right arm at 4 cm, trial 2');
  test('a fragment leads to the value it names, or to the one that a query is about', () => {
    expect(keyAtFragment(`#${anchorOf(right?.key ?? '')}`, items, [])).toBe(right?.key);
    const queries = [{ id: 'q7', target: right?.target ?? { table: 'visit' as const, id: '', field: '' } }];
    expect(keyAtFragment('#query-q7', items, queries)).toBe(right?.key);
    expect(keyAtFragment('#query-q8', items, queries)).toBeNull();
    expect(keyAtFragment('', items, queries)).toBeNull();
  });
  test('from line to line it stays on the arm, and takes the first where there is none', () => {
    const [wrist] = parts[1]?.rows ?? [];
    const [date] = parts[0]?.rows ?? [];
    expect(wrist && itemLike(wrist, 'right')?.label).toBe('Right arm at 0 cm, trial 1');
    expect(wrist && itemLike(wrist, undefined)?.label).toBe('Left arm at 0 cm, trial 1');
    expect(date && itemLike(date, 'right')?.label).toBe('Date of visit');
  });
});

describe('the single keys of the review', () => {
  const press = (key: string, held: Partial<{ ctrlKey: boolean; metaKey: boolean; altKey: boolean }> = {}) => ({ key, ctrlKey: false, metaKey: false, altKey: false, ...held });
  test('mean one thing each', () => {
    expect(['v', 'm', 'h', ']', 'j', 'k', 'c'].map((key) => reviewKeyOf(press(key), false))).toEqual(['seen', 'write', 'history', 'next form', 'next', 'before', 'correct']);
  });
  test('mean nothing while a word is typed or a modifier is held', () => {
    expect(reviewKeyOf(press('v'), true)).toBeNull();
    expect(reviewKeyOf(press('v', { ctrlKey: true }), false)).toBeNull();
    expect(reviewKeyOf(press('x'), false)).toBeNull();
  });
});

describe('what stands beside the tape', () => {
  test('comes back from the server as it was sent', () => {
    expect(readCircumstances(typedCircumstances(circumstances))).toEqual({ values: circumstances, problems: {} });
  });
  test('takes a decimal comma, and says in words what it cannot take', () => {
    const typed = { ...typedCircumstances(circumstances), bodyWeight: '71,4', impedanceRatio: '4', hoursSinceTraining: 'two' };
    const { values, problems } = readCircumstances(typed);
    expect(values).toMatchObject({ bodyWeightG: 71_400, impedanceRatio: null, hoursSinceTraining: null });
    expect(Object.keys(problems).toSorted()).toEqual(['hoursSinceTraining', 'impedanceRatio']);
    expect(readCircumstances({ ...typed, bodyWeight: '741' }).problems.bodyWeight).toMatch(/over the limit of 250\. Was it 74\.1/);
  });
  test('a ratio beyond its limits is named, with what it may have been; a comma is a decimal', () => {
    const ratio = (impedanceRatio: string) => readCircumstances({ ...typedCircumstances(circumstances), impedanceRatio });
    expect(ratio('10,5').problems.impedanceRatio).toBe('You typed 10.5; the ratio lies between 0.5 and 3. Was it 1.05?');
    expect(ratio('105').problems.impedanceRatio).toBe('You typed 105; the ratio lies between 0.5 and 3. Was it 1.05?');
    expect(ratio('4').problems.impedanceRatio).toBe('You typed 4; the ratio lies between 0.5 and 3. Measure it again.');
    expect(ratio('one').problems.impedanceRatio).toBe('‘one’ is not a number. Type digits and one decimal point or comma, such as 1.05.');
    expect(ratio('1,045')).toMatchObject({ values: { impedanceRatio: 1.045 }, problems: {} });
    const sent = saveCircumstancesInput.safeParse({ ...circumstances, id: '0190b8f0-0000-7000-8000-000000000001', impedanceRatio: 10.5 });
    expect(sent.error?.issues.map(({ message }) => message)).toEqual(['You typed 10.5; the ratio lies between 0.5 and 3. Was it 1.05?']);
  });
  test('a weight that is usual in pounds has one answer: that figure, or a reason', () => {
    // 206 lb × 0.45359237 kg (exact by definition) = 93.44 kg.
    expect(doubtsBeside({ ...circumstances, bodyWeightG: 206_000 })).toEqual([
      {
        place: 'weight',
        check: 'weight.range',
        severity: 'soft',
        message: '206 kg is unusual. If it was read in pounds, it is 93.4 kg. Change it, or keep it and say why.',
        likely: { typed: '93.4', unit: 'kg' },
      },
    ]);
    expect(doubtsBeside({ ...circumstances, bodyWeightG: 93_400 })).toEqual([]);
    expect(doubtsBeside({ ...circumstances, bodyWeightG: 35_000 })[0]).not.toHaveProperty('likely');
  });
  test('doubts an unusual weight and a ratio that may be swapped', () => {
    expect(doubtsBeside({ ...circumstances, bodyWeightG: 171_000, impedanceRatio: 0.7 }).map(({ place, severity }) => [place, severity])).toEqual([
      ['weight', 'soft'],
      ['ratio', 'soft'],
    ]);
    expect(doubtsBeside(circumstances)).toEqual([]);
  });
});
