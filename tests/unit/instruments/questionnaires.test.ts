import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { answersSchema } from '@/instruments/questionnaires/answers-schema';
import { armSymptoms } from '@/instruments/questionnaires/arm-symptoms';
import { dailyTasks } from '@/instruments/questionnaires/daily-tasks';
import { defineQuestionnaire, elementsOf, type Questionnaire, type SurveyElement } from '@/instruments/questionnaires/define-questionnaire';
import { questionnaires } from '@/instruments/questionnaires/index';
import { liftingConfidence } from '@/instruments/questionnaires/lifting-confidence';
import { alertsFor, itemStates, scoreQuestionnaire, scoreScale } from '@/instruments/questionnaires/score';
import { validateAnswers } from '@/instruments/questionnaires/validate';

const allAt = (questionnaire: Questionnaire, value: number) => Object.fromEntries(elementsOf(questionnaire.survey).map(({ name }) => [name, value]));
const valueOf = (questionnaire: Questionnaire, answers: Record<string, number | string>, code: string) =>
  scoreQuestionnaire(questionnaire, answers).scores.find((score) => score.code === code);

describe('scoring', () => {
  test('exactly half answered scores by one rule and not by the other', () => {
    const half = [2, 3, null, null];
    expect(scoreScale(half, { min: 1, max: 4, direction: 'as items', missingRule: { atLeast: 'half' } }).value).toBeCloseTo(50, 9);
    expect(scoreScale(half, { min: 1, max: 4, direction: 'as items', missingRule: { moreThan: 'half' } })).toMatchObject({ value: null, reason: '2 of 4 questions answered; 3 are needed.' });
  });

  test('left out and not tried count as missing, never as zero', () => {
    const answers = { ...allAt(dailyTasks, 1), shelf: 'left-out', bag: 'not-tried' };
    expect(valueOf(dailyTasks, answers, 'function')).toMatchObject({ answered: 8, items: 10 });
    expect(valueOf(dailyTasks, answers, 'function')?.value).toBeCloseTo(66.667, 2);
    expect(valueOf(liftingConfidence, { 'lift-home': 2, 'train-alone': 2 }, 'confidence')?.value).toBeNull();
    expect(valueOf(liftingConfidence, {}, 'worry')).toMatchObject({ value: null, answered: 0 });
  });

  test('stays within 0 and 100 and does not heed the order of items', () => {
    fc.assert(fc.property(fc.array(fc.option(fc.integer({ min: 0, max: 3 })), { minLength: 1, maxLength: 10 }), fc.constantFrom('as items' as const, 'turned' as const), (values, direction) => {
      const rule = { min: 0, max: 3, direction, missingRule: { atLeast: 'half' as const } };
      const { value } = scoreScale(values, rule);
      if (value !== null) {
        expect(value).toBeGreaterThanOrEqual(-1e-9);
        expect(value).toBeLessThanOrEqual(100 + 1e-9);
      }
      expect(scoreScale(values.toReversed(), rule).value ?? -1).toBeCloseTo(value ?? -1, 9);
    }));
  });

  test('refuses a value off the scale', () => {
    expect(() => scoreScale([9], { min: 0, max: 3, direction: 'as items', missingRule: { atLeast: 'half' } })).toThrow(RangeError);
  });

  test('tells answered, left out and not reached apart', () => {
    expect(itemStates(dailyTasks, { shelf: 0, bag: 'left-out', jar: 'not-tried' })).toMatchObject({ shelf: 'answered', bag: 'left out', jar: 'answered', sport: 'not reached' });
  });

  test('a hot or red arm alerts at once, as does clear swelling', () => {
    expect(alertsFor(armSymptoms, { warmth: 1, swelling: 2 }).map(({ level }) => level)).toEqual(['R1', 'S1']);
    expect(alertsFor(armSymptoms, { warmth: 0, swelling: 1 })).toEqual([]);
    expect(alertsFor(armSymptoms, { warmth: 'left-out' })).toEqual([]);
  });
});

describe('the answers’ schema', () => {
  const schema = answersSchema(dailyTasks);

  test('accepts every choice offered and a partial save', () => {
    for (const questionnaire of questionnaires) {
      for (const element of elementsOf(questionnaire.survey)) {
        if (element.type !== 'radiogroup') continue;
        for (const { value } of element.choices) expect(answersSchema(questionnaire).safeParse({ [element.name]: value }).success).toBe(true);
      }
      expect(answersSchema(questionnaire).safeParse({}).success).toBe(true);
    }
  });

  test('refuses an unknown question, a stray choice, a number in words and a list', () => {
    for (const bad of [{ shelf: 99 }, { shelf: '2' }, { shelf: [1] }, { shelf: null }, { unknown: 1 }, { __proto__x: 1 }, 'text', null, []]) {
      expect(schema.safeParse(bad).success).toBe(false);
    }
  });

  test('throws on a question type it has no schema for', () => {
    const odd = { type: 'rating', name: 'odd', title: { default: 'Odd' }, isRequired: false } as unknown as SurveyElement;
    const questionnaire = { ...dailyTasks, survey: { ...dailyTasks.survey, pages: [{ name: 'p', elements: [odd] }] } };
    expect(() => answersSchema(questionnaire)).toThrow(RangeError);
  });

  test('a scale that names no item cannot be defined', () => {
    const { note: _note, ...definition } = dailyTasks;
    expect(() => defineQuestionnaire({ ...definition, alerts: [{ item: 'nowhere', atLeast: 1, level: 'S1' }] })).toThrow('nowhere');
  });
});

describe('the server’s check', () => {
  test('keeps complete, partial and empty answers as they are', () => {
    for (const questionnaire of questionnaires) {
      const full = allAt(questionnaire, 1);
      expect(validateAnswers(questionnaire, full)).toEqual({ ok: true, data: full });
      expect(validateAnswers(questionnaire, {})).toEqual({ ok: true, data: {} });
    }
  });

  test('drops an answer to a question that ended up hidden', () => {
    const none = { ...allAt(armSymptoms, 0), bother: 2 };
    const checked = validateAnswers(armSymptoms, none);
    expect(checked).toMatchObject({ ok: true });
    expect(checked.ok && 'bother' in checked.data).toBe(false);
    const leftOut = { swelling: 'left-out', bother: 1 };
    expect(validateAnswers(armSymptoms, leftOut)).toEqual({ ok: true, data: { swelling: 'left-out' } });
    expect(validateAnswers(armSymptoms, { ...none, heaviness: 1 })).toEqual({ ok: true, data: { ...none, heaviness: 1 } });
  });

  test('refuses with the item and a sentence', () => {
    expect(validateAnswers(dailyTasks, { shelf: 99 })).toEqual({ ok: false, errors: [{ item: 'shelf', message: 'Choose one of the answers offered.' }] });
    expect(validateAnswers(dailyTasks, { hidden: 1 }).ok).toBe(false);
  });

  test('asks for a required answer by survey-core’s own model', () => {
    const [first] = elementsOf(dailyTasks.survey);
    if (!first) throw new Error('The questionnaire is empty.');
    const strict = { ...dailyTasks, survey: { ...dailyTasks.survey, pages: [{ name: 'p', elements: [{ ...first, isRequired: true }] }] } };
    const checked = validateAnswers(strict, {});
    expect(checked).toMatchObject({ ok: false, errors: [{ item: 'shelf' }] });
  });
});
