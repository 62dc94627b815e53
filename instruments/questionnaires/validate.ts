import { Model } from 'survey-core';
import { type AnswerData, answersSchema } from './answers-schema';
import type { Questionnaire } from './define-questionnaire';

export type AnswersChecked =
  /** `data` is what to store: answers to questions that ended up hidden are gone. */
  | { readonly ok: true; readonly data: AnswerData }
  | { readonly ok: false; readonly errors: readonly { readonly item: string | null; readonly message: string }[] };

/**
 * The server's check of submitted answers, for Node and not for the browser bundle. First the schema (survey-core by
 * itself lets unknown questions and stray choices pass), then survey-core's own model for what is visible and required.
 */
export function validateAnswers(questionnaire: Questionnaire, submitted: unknown): AnswersChecked {
  const parsed = answersSchema(questionnaire).safeParse(submitted);
  if (!parsed.success) {
    return { ok: false, errors: parsed.error.issues.map(({ path, message }) => ({ item: path.length > 0 ? String(path[0]) : null, message })) };
  }
  return runModel(questionnaire, parsed.data);
}

function runModel(questionnaire: Questionnaire, answers: AnswerData): AnswersChecked {
  // Taking focus throws where there is no document.
  const model = new Model({ ...questionnaire.survey, autoFocusFirstError: false });
  try {
    model.data = answers;
    if (!model.validate(true, false)) {
      const errors = model.getAllQuestions().flatMap((question) => question.errors.map((error) => ({ item: question.name, message: error.getText() })));
      return { ok: false, errors };
    }
    model.doComplete();
    return { ok: true, data: model.data as AnswerData };
  } finally {
    model.dispose();
  }
}
