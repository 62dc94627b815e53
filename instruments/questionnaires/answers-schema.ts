import { z } from 'zod';
import { elementsOf, type Questionnaire, type SurveyElement } from './define-questionnaire';

/** Saved answers; a question not reached is absent. */
export type AnswerData = Record<string, number | string | undefined>;

/**
 * The shape of answers to one questionnaire, made from the survey itself: only its questions, only their choices. Every
 * question may be absent (a partial save). A question type without a schema throws RangeError, so none slips through.
 */
export function answersSchema(questionnaire: Questionnaire): z.ZodType<AnswerData> {
  const shape = Object.fromEntries(elementsOf(questionnaire.survey).map((element) => [element.name, answerSchema(element).optional()]));
  return z.strictObject(shape);
}

function answerSchema(element: SurveyElement): z.ZodType<number | string> {
  switch (element.type) {
    case 'radiogroup':
      return z.literal(element.choices.map(({ value }) => value), { error: 'Choose one of the answers offered.' });
    case 'comment':
      return z.string().max(element.maxLength, `Write at most ${element.maxLength} characters.`);
    default:
      return unknownType(element);
  }
}

function unknownType(element: never): never {
  throw new RangeError(`No schema for the question type of ${JSON.stringify(element)}.`);
}
