import { alertsFor, scoreQuestionnaire } from '@/instruments/questionnaires/score';
import { elementsOf } from '@/instruments/questionnaires/define-questionnaire';
import { validateAnswers } from '@/instruments/questionnaires/validate';
import { refuseAfterLeaving } from '@/lib/people/find-own-record';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { areSame, assertOpen, findOwnResponse, type OwnResponse } from './find-response';
import { leftOutOf } from './save-answers';
import { alertViews, type AlertView } from './view-questionnaire';

/** A questionnaire once it is in. */
export interface AnswersSubmitted {
  readonly id: string;
  readonly isLate: boolean;
  /** What must not wait for the site, said again. */
  readonly alerts: readonly AlertView[];
  readonly version: number;
}

function toSubmitted({ own, response, questionnaire }: OwnResponse): AnswersSubmitted {
  const alerts = alertsFor(questionnaire, response.answers as Record<string, number | string>);
  return {
    id: response.id,
    isLate: own.today > response.dueOn,
    alerts: alertViews(questionnaire).filter(({ item }) => alerts.some((alert) => alert.item === item)),
    version: response.version,
  };
}

/**
 * Checks the answers with the questionnaire's own model, scores them, and closes the questionnaire. Pressed twice, it is submitted once.
 * @throws Refusal 'invalid' at the first wrong item, 'locked' when it was submitted with other answers, 'expired' after the window.
 */
export async function submitAnswers(work: Work, { id, answers }: { id: string; answers: Record<string, number | string> }): Promise<AnswersSubmitted> {
  const found = await findOwnResponse(work, id);
  const { own, response, questionnaire } = found;
  const checked = validateAnswers(questionnaire, answers);
  if (!checked.ok) {
    const [first] = checked.errors;
    throw new Refusal('invalid', first?.message ?? 'An answer is not one of those offered.', first?.item ? `answers.${first.item}` : 'answers');
  }
  const data = checked.data as Record<string, number | string>;
  if (response.state === 'submitted' && areSame(response.answers, data)) return toSubmitted(found);
  refuseAfterLeaving(own, 'answers');
  assertOpen(found);
  if (Object.keys(data).length === 0) throw new Refusal('invalid', 'Nothing is answered yet. Answer a question, or leave each out on purpose.', 'answers');
  work.expect(response);
  response.state = 'submitted';
  response.startedAt ??= work.now;
  response.submittedAt = work.now;
  response.answers = data;
  response.leftOut = leftOutOf(data);
  response.page = elementsOf(questionnaire.survey).length;
  response.scores = Object.fromEntries(scoreQuestionnaire(questionnaire, data).scores.map(({ code, value }) => [code, value]));
  await work.em.flush();
  return toSubmitted(found);
}
