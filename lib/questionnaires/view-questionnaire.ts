import type { QuestionnaireResponse } from '@/entities/questionnaire-response';
import { elementsOf, type Questionnaire, type SurveyJson } from '@/instruments/questionnaires/define-questionnaire';
import { safetyVerdict } from '@/instruments/safety/judge-symptom-report';
import type { Work } from '@/lib/work/work';
import { findOwnResponse } from './find-response';

/** An answer that must not wait, with what is shown at once. */
export interface AlertView {
  readonly item: string;
  readonly atLeast: number;
  readonly title: string;
  readonly text: string;
}

/** A questionnaire as its participant sees it. */
export interface QuestionnaireView {
  readonly id: string;
  readonly key: string;
  readonly title: string;
  readonly recall: string;
  readonly minutes: number;
  readonly note: string;
  readonly survey: SurveyJson;
  readonly itemCount: number;
  readonly answers: Readonly<Record<string, number | string>>;
  readonly page: number;
  readonly state: QuestionnaireResponse['state'];
  readonly dueOn: string;
  readonly opensOn: string;
  readonly closesOn: string;
  readonly isOpen: boolean;
  readonly alerts: readonly AlertView[];
  readonly version: number;
}

/** What the alerts of a questionnaire say, gravest wording as the level has it. */
export const alertViews = ({ alerts }: Questionnaire): AlertView[] =>
  alerts.map(({ item, atLeast, level }) => {
    const { participantTitle, participantText } = safetyVerdict(level);
    return { item, atLeast, title: participantTitle, text: participantText };
  });

export function toQuestionnaireView(response: QuestionnaireResponse, questionnaire: Questionnaire, today: string): QuestionnaireView {
  return {
    id: response.id,
    key: questionnaire.key,
    title: questionnaire.title,
    recall: questionnaire.recall,
    minutes: questionnaire.minutes,
    note: questionnaire.note,
    survey: questionnaire.survey,
    itemCount: elementsOf(questionnaire.survey).length,
    answers: response.answers as Record<string, number | string>,
    page: response.page,
    state: response.state,
    dueOn: response.dueOn,
    opensOn: response.opensOn,
    closesOn: response.closesOn,
    isOpen: (response.state === 'due' || response.state === 'in progress') && today >= response.opensOn && today <= response.closesOn,
    alerts: alertViews(questionnaire),
    version: response.version,
  };
}

/** @throws Refusal 'not-found'. */
export async function viewQuestionnaire(work: Work, { id }: { id: string }): Promise<QuestionnaireView> {
  const { own, response, questionnaire } = await findOwnResponse(work, id);
  return toQuestionnaireView(response, questionnaire, own.today);
}
