/** A text with room for translations: survey-core takes `default` where the reader's language is missing. */
export interface Text {
  readonly default: string;
  readonly [locale: string]: string;
}

export interface Choice {
  /** A number scores; a word is an answer that does not ('left-out', 'not-tried'). */
  readonly value: number | string;
  readonly text: Text;
}

/** The element types our questionnaires use. Another type needs a schema in `answers-schema.ts` first. */
export type SurveyElement =
  | { readonly type: 'radiogroup'; readonly name: string; readonly title: Text; readonly description?: Text; readonly choices: readonly Choice[]; readonly isRequired: boolean; readonly visibleIf?: string }
  | { readonly type: 'comment'; readonly name: string; readonly title: Text; readonly description?: Text; readonly maxLength: number; readonly isRequired: boolean; readonly visibleIf?: string };

export interface SurveyPage {
  readonly name: string;
  readonly elements: readonly SurveyElement[];
}

/** The part of survey-core's JSON that we write. */
export interface SurveyJson {
  readonly title: Text;
  readonly showQuestionNumbers: 'off' | 'on';
  readonly checkErrorsMode: 'onNextPage';
  readonly clearInvisibleValues: 'onComplete';
  readonly pages: readonly SurveyPage[];
}

/** How many unanswered items a scale bears. 'half' conventions differ at exactly half answered, so each scale says. */
export type MissingRule = { readonly atLeast: 'half' } | { readonly moreThan: 'half' } | { readonly maxMissing: number };

export interface Scale {
  readonly code: string;
  readonly name: string;
  readonly items: readonly string[];
  readonly min: number;
  readonly max: number;
  /** `as items` keeps the direction of the items (more symptom, higher score); `turned` turns it (less hindrance, higher score). */
  readonly direction: 'as items' | 'turned';
  /** What a high score says, as printed beside it: 'more symptoms'. */
  readonly highMeans: string;
  readonly missingRule: MissingRule;
}

/** An answer that must not wait for the site: the safety text of the level is shown at once. */
export interface AnswerAlert {
  readonly item: string;
  readonly atLeast: number;
  readonly level: 'R1' | 'S1';
}

export interface Questionnaire {
  readonly key: string;
  /** Raised with any change of wording, order, choices or scoring; responses keep the version they were given to. */
  readonly version: number;
  readonly title: string;
  readonly construct: string;
  /** The time the questions ask about, as printed. */
  readonly recall: string;
  readonly minutes: number;
  readonly survey: SurveyJson;
  readonly scales: readonly Scale[];
  readonly alerts: readonly AnswerAlert[];
  readonly note: string;
}

export const STUDY_NOTE = 'Study questionnaire in our own words, not a validated scale.';

/** Types a questionnaire; the registry in `index.ts` lists it. Throws RangeError when a scale or alert names no item. */
export function defineQuestionnaire(definition: Omit<Questionnaire, 'note'>): Questionnaire {
  const names = new Set(elementsOf(definition.survey).map(({ name }) => name));
  const named = [...definition.scales.flatMap(({ items }) => items), ...definition.alerts.map(({ item }) => item)];
  const strays = named.filter((name) => !names.has(name));
  if (strays.length > 0) throw new RangeError(`${definition.key} has no item ${strays.join(', ')}.`);
  return { ...definition, note: STUDY_NOTE };
}

export function elementsOf(survey: SurveyJson): SurveyElement[] {
  return survey.pages.flatMap(({ elements }) => elements);
}
