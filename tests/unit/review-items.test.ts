import { describe, expect, test } from 'vitest';
import { countSeen, keyOfPlace, keyOfTarget, partsOfReview, printValue } from '@/components/margin/review-items';
import { reviewKeyOf } from '@/components/margin/review-keys';
import { doubtsBeside, readCircumstances, typedCircumstances } from '@/components/measurement/beside-tape';
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
  test('doubts an unusual weight and a ratio that may be swapped', () => {
    expect(doubtsBeside({ ...circumstances, bodyWeightG: 171_000, impedanceRatio: 0.7 }).map(({ place, severity }) => [place, severity])).toEqual([
      ['weight', 'soft'],
      ['ratio', 'soft'],
    ]);
    expect(doubtsBeside(circumstances)).toEqual([]);
  });
});
