import type { Choice, SurveyElement, SurveyJson, SurveyPage, Text } from './define-questionnaire';

/** Said on purpose, and so told apart from a question never reached. */
export const LEFT_OUT = 'left-out';
const leftOut: Choice = { value: LEFT_OUT, text: { default: 'Leave this question out' } };

/** A word for 'could not answer' that is no score: the task was not tried. */
export const NOT_TRIED = 'not-tried';
export const notTried: Choice = { value: NOT_TRIED, text: { default: 'I did not try' } };

export const howMuch: readonly Choice[] = [
  { value: 0, text: { default: 'Not at all' } },
  { value: 1, text: { default: 'A little' } },
  { value: 2, text: { default: 'Quite a lot' } },
  { value: 3, text: { default: 'Very much' } },
];

/** One question with worded choices, none preset, and a way to leave it out. */
export function worded(name: string, title: string, choices: readonly Choice[], visibleIf?: string): SurveyElement {
  return { type: 'radiogroup', name, title: text(title), choices: [...choices, leftOut], isRequired: false, ...(visibleIf && { visibleIf }) };
}

/** One question a page, so that a phone shows the whole of it. */
export function onePerPage(title: string, elements: readonly SurveyElement[]): SurveyJson {
  const pages: SurveyPage[] = elements.map((element) => ({ name: `page-${element.name}`, elements: [element] }));
  return { title: text(title), showQuestionNumbers: 'off', checkErrorsMode: 'onNextPage', clearInvisibleValues: 'onComplete', pages };
}

function text(words: string): Text {
  return { default: words };
}
