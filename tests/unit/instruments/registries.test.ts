import { describe, expect, test } from 'vitest';
import { editChecks } from '@/instruments/checks/index';
import type { GirthMethod } from '@/instruments/measurement/define-measurement-method';
import { girthMethod, type GirthMethodCode, measurementMethods } from '@/instruments/measurement/index';
import { limbVolume } from '@/instruments/measurement/limb-volume';
import { elementsOf } from '@/instruments/questionnaires/define-questionnaire';
import { findQuestionnaire, questionnaires } from '@/instruments/questionnaires/index';
import { scoreQuestionnaire } from '@/instruments/questionnaires/score';
import { swellingCodes, swellingDefinitions } from '@/instruments/swelling/index';
import { exercises } from '@/instruments/training/exercises';
import { trainingRules } from '@/instruments/training/index';
import { defaultTrainingSettings } from '@/instruments/training/settings';

const sorted = (names: readonly string[]): string[] => names.toSorted((a, b) => (a < b ? -1 : 1));
const isListed = (names: readonly string[]): void => {
  expect(names).toEqual(sorted(names));
  expect(new Set(names).size).toBe(names.length);
};

describe('the registries', () => {
  test('stand in alphabetical order, each name once', () => {
    isListed(measurementMethods.map(({ code }) => code));
    isListed(trainingRules.map(({ code }) => code));
    isListed(editChecks.map(({ id }) => id));
    isListed(exercises.map(({ code }) => code));
    isListed(questionnaires.map(({ key, version }) => `${key} ${version}`));
  });

  test('the definitions of swelling stand in order of their number', () => {
    expect(swellingDefinitions.map(({ code }) => code)).toEqual([...swellingCodes]);
    expect(swellingCodes.map((code) => Number(code.slice(1)))).toEqual(Array.from({ length: 11 }, (_, i) => i + 1));
  });
});

describe('a measurement method', () => {
  const computing = measurementMethods.filter((method): method is GirthMethod => method.from === 'girths');
  test.each(computing.map((method) => [method.code, method] as const))('%s computes its worked example', (code, { example }) => {
    const { volumeMl } = limbVolume({ method: code as GirthMethodCode, girthsMm: example.girthsMm, lengthsMm: example.lengthsMm });
    expect(volumeMl).toBeCloseTo(example.volumeMl, 2);
    expect(girthMethod(code as GirthMethodCode).code).toBe(code);
  });
});

describe('a training rule', () => {
  test.each(trainingRules.map((rule) => [rule.code, rule] as const))('%s has an example that passes and one that fires', (_code, rule) => {
    const settings = { ...defaultTrainingSettings, shortBreakDays: 14, minDaysSinceRaise: 6, minSessionsAtLoad: 2 };
    const [passes, fires] = rule.scope === 'load'
      ? [rule.applies(rule.examples.passes, settings), rule.applies(rule.examples.fires, settings)]
      : [rule.applies(rule.examples.passes, settings), rule.applies(rule.examples.fires, settings)];
    expect({ passes, fires }).toEqual({ passes: false, fires: true });
  });
});

describe('an edit check', () => {
  test.each(editChecks.map((check) => [check.id, check] as const))('%s passes its good example and fires on its bad one', (id, check) => {
    const { pass, fires } = check.runExamples();
    expect(pass).toBeNull();
    expect(fires).toMatchObject({ check: id, version: check.version, severity: check.severity });
    // A message is at least one whole sentence, and never shouts.
    expect(fires?.message).toMatch(/[.?]$/);
    expect(fires?.message).not.toMatch(/!|please|oops|successfully/i);
  });
});

describe('a questionnaire', () => {
  const each = questionnaires.map((questionnaire) => [questionnaire.key, questionnaire] as const);

  test.each(each)('%s scores its all-lowest and all-highest answers at the ends of the scale', (_key, questionnaire) => {
    for (const scale of questionnaire.scales) {
      const all = (value: number) => Object.fromEntries(scale.items.map((item) => [item, value]));
      const scoreOf = (value: number) => scoreQuestionnaire(questionnaire, all(value)).scores.find(({ code }) => code === scale.code)?.value;
      const ends = scale.direction === 'turned' ? [100, 0] : [0, 100];
      expect([scoreOf(scale.min), scoreOf(scale.max)]).toEqual(ends);
    }
  });

  test.each(each)('%s offers only choices its scales know, and always a way to leave out', (_key, questionnaire) => {
    for (const element of elementsOf(questionnaire.survey)) {
      expect(element.isRequired).toBe(false);
      expect('defaultValue' in element).toBe(false);
      if (element.type !== 'radiogroup') continue;
      const values = element.choices.map(({ value }) => value);
      expect(values).toContain('left-out');
      const scale = questionnaire.scales.find(({ items }) => items.includes(element.name));
      const numbers = values.filter((value) => typeof value === 'number');
      if (scale) expect([Math.min(...numbers), Math.max(...numbers)]).toEqual([scale.min, scale.max]);
    }
  });

  test.each(each)('%s asks one question a page, each name once', (_key, { survey }) => {
    expect(survey.pages.every(({ elements }) => elements.length === 1)).toBe(true);
    const names = elementsOf(survey).map(({ name }) => name);
    expect(new Set(names).size).toBe(names.length);
  });

  test.each(each)('%s reads at grade 6 or below (Flesch-Kincaid)', (_key, { survey }) => {
    const text = elementsOf(survey).map(({ title }) => title.default).join(' ');
    expect(readingGrade(text)).toBeLessThanOrEqual(6);
  });

  test.each(each)('%s says that it is not a validated scale and is found by key', (key, questionnaire) => {
    expect(questionnaire.note).toContain('not a validated scale');
    expect(findQuestionnaire(key)).toBe(questionnaire);
    expect(findQuestionnaire(key, 99)).toBeUndefined();
  });
});

/** Flesch-Kincaid grade (Kincaid 1975): 0.39 words per sentence + 11.8 syllables per word − 15.59. */
function readingGrade(text: string): number {
  const sentences = text.split(/[.?]+/).filter((sentence) => sentence.trim() !== '');
  const words = text.match(/[a-z’]+/gi) ?? [];
  const syllables = words.reduce((sum, word) => sum + syllablesIn(word.toLowerCase()), 0);
  return (0.39 * words.length) / sentences.length + (11.8 * syllables) / words.length - 15.59;
}

function syllablesIn(word: string): number {
  const groups = word.replace(/e$/, '').match(/[aeiouy]+/g) ?? [];
  return Math.max(1, groups.length);
}
