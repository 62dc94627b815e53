import { type AnswerAlert, elementsOf, type MissingRule, type Questionnaire, type Scale } from './define-questionnaire';

/** Stored with every score; raise it when a formula here changes its result. */
export const SCORING_VERSION = '1.0.0';

/** One answer: a scored number, or a word such as 'left-out'. A key that is absent was not reached. */
export type Answers = Readonly<Record<string, number | string | undefined>>;

export interface ScaleScore {
  readonly code: string;
  readonly name: string;
  readonly highMeans: string;
  /** 0 to 100, or null with a reason. */
  readonly value: number | null;
  readonly answered: number;
  readonly items: number;
  readonly reason?: string;
}

export interface QuestionnaireScore {
  readonly key: string;
  readonly version: number;
  readonly scoringVersion: string;
  readonly scores: readonly ScaleScore[];
}

/** Every scale's score. Answers that are words do not score and count as missing. */
export function scoreQuestionnaire(questionnaire: Questionnaire, answers: Answers): QuestionnaireScore {
  const scores = questionnaire.scales.map((scale) => {
    const values = scale.items.map((item) => {
      const answer = answers[item];
      return typeof answer === 'number' ? answer : null;
    });
    return { code: scale.code, name: scale.name, highMeans: scale.highMeans, ...scoreScale(values, scale) };
  });
  return { key: questionnaire.key, version: questionnaire.version, scoringVersion: SCORING_VERSION, scores };
}

/**
 * Linear 0 to 100: the mean of the answered items over the range, turned where high items mean worse function.
 * (The form of the EORTC scoring manual of 2001, from memory; checks PRO-01 to PRO-12.) Throws RangeError on a value
 * outside the scale.
 */
export function scoreScale(
  values: readonly (number | null)[],
  { min, max, direction, missingRule }: Pick<Scale, 'min' | 'max' | 'direction' | 'missingRule'>,
): Pick<ScaleScore, 'value' | 'answered' | 'items' | 'reason'> {
  const given = values.filter((value) => value !== null);
  const counts = { answered: given.length, items: values.length };
  const stray = given.find((value) => !(value >= min && value <= max));
  if (stray !== undefined) throw new RangeError(`${stray} is not between ${min} and ${max}.`);
  if (!hasEnough(counts, missingRule)) {
    return { value: null, ...counts, reason: `${counts.answered} of ${counts.items} questions answered; ${needed(missingRule, counts.items)} are needed.` };
  }
  const share = (given.reduce((sum, value) => sum + value, 0) / given.length - min) / (max - min);
  return { value: 100 * (direction === 'turned' ? 1 - share : share), ...counts };
}

function hasEnough({ answered, items }: { answered: number; items: number }, rule: MissingRule): boolean {
  if (answered === 0) return false;
  if ('maxMissing' in rule) return items - answered <= rule.maxMissing;
  return 'atLeast' in rule ? 2 * answered >= items : 2 * answered > items;
}

function needed(rule: MissingRule, items: number): string {
  if ('maxMissing' in rule) return `${Math.max(1, items - rule.maxMissing)}`;
  return `${'atLeast' in rule ? Math.max(1, Math.ceil(items / 2)) : Math.floor(items / 2) + 1}`;
}

/** The alerts that the answers set off, in the order the questionnaire lists them. */
export function alertsFor(questionnaire: Questionnaire, answers: Answers): AnswerAlert[] {
  return questionnaire.alerts.filter(({ item, atLeast }) => {
    const answer = answers[item];
    return typeof answer === 'number' && answer >= atLeast;
  });
}

export type ItemState = 'answered' | 'left out' | 'not reached';

/** For each item whether it was answered, left out on purpose, or never reached. */
export function itemStates(questionnaire: Questionnaire, answers: Answers): Record<string, ItemState> {
  return Object.fromEntries(elementsOf(questionnaire.survey).map(({ name }) => {
    const answer = answers[name];
    return [name, answer === undefined ? 'not reached' : answer === 'left-out' ? 'left out' : 'answered'];
  }));
}

/** A change held against the smallest that matters (`mid`) and the smallest that is not noise (`mdc`), in score points. */
export function changeOfScore({ before, after, mid, mdc, highIsWorse }: { before: number; after: number; mid: number; mdc: number; highIsWorse: boolean }): {
  change: number;
  exceedsMid: boolean;
  exceedsMdc: boolean;
  direction: 'improved' | 'worsened' | 'unchanged';
} {
  const change = after - before;
  const direction = change === 0 ? 'unchanged' : change > 0 === highIsWorse ? 'worsened' : 'improved';
  return { change, exceedsMid: Math.abs(change) >= mid, exceedsMdc: Math.abs(change) >= mdc, direction };
}
