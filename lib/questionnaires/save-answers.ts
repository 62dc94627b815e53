import { answersSchema } from '@/instruments/questionnaires/answers-schema';
import { LEFT_OUT } from '@/instruments/questionnaires/items';
import { refuseAfterLeaving } from '@/lib/people/find-own-record';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { areSame, assertOpen, findOwnResponse } from './find-response';
import { toQuestionnaireView, type QuestionnaireView } from './view-questionnaire';

/** The items that were left out on purpose. */
export const leftOutOf = (answers: Readonly<Record<string, unknown>>): string[] => Object.keys(answers).filter((name) => answers[name] === LEFT_OUT);

/**
 * Keeps what is answered so far, so that it can be gone on with elsewhere. The same answers again, after a lost reply, are no change.
 * @throws Refusal 'invalid' for an unknown question or an answer that was not offered, 'locked' after submitting, 'expired' after the window, 'stale' when another device went on.
 */
export async function saveAnswers(work: Work, { id, answers, page }: { id: string; answers: Record<string, number | string>; page: number }): Promise<QuestionnaireView> {
  const found = await findOwnResponse(work, id);
  const { own, response, questionnaire } = found;
  refuseAfterLeaving(own, 'answers');
  assertOpen(found);
  const parsed = answersSchema(questionnaire).safeParse(answers);
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    throw new Refusal('invalid', issue?.code === 'unrecognized_keys' ? 'That is not a question of this questionnaire.' : (issue?.message ?? 'That is not one of the answers offered.'), `answers.${String(issue?.path[0] ?? '')}`);
  }
  if (areSame(response.answers, answers) && response.page === page) return toQuestionnaireView(response, questionnaire, own.today);
  work.expect(response);
  response.state = 'in progress';
  response.startedAt ??= work.now;
  response.answers = { ...answers };
  response.leftOut = leftOutOf(answers);
  response.page = page;
  await work.em.flush();
  return toQuestionnaireView(response, questionnaire, own.today);
}
