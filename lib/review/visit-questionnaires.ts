import { findQuestionnaire } from '@/instruments/questionnaires';
import { elementsOf, type SurveyElement } from '@/instruments/questionnaires/define-questionnaire';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** One answer in the words of the questionnaire. */
export interface AnswerView {
  readonly item: string;
  readonly question: string;
  readonly answer: string;
}

/** A questionnaire of the visit, as it stands. Answers are shown once it was submitted. */
export interface VisitQuestionnaireView {
  readonly id: string;
  readonly title: string;
  readonly state: 'due' | 'in progress' | 'submitted' | 'missed';
  readonly submittedAt: string | null;
  readonly answers: readonly AnswerView[];
}

interface Row {
  id: string;
  instrument: string;
  instrument_version: number;
  state: VisitQuestionnaireView['state'];
  submitted_at: string | null;
  answers: Record<string, unknown>;
}

function inWords(element: SurveyElement, answer: unknown): string {
  if (element.type === 'comment') return String(answer);
  return element.choices.find(({ value }) => value === answer)?.text.default ?? String(answer);
}

/** The questionnaires of one visit with their answers in words: one statement. */
export async function questionnairesOfVisit(work: Work, visitId: string): Promise<VisitQuestionnaireView[]> {
  const rows = await work.sql<Row>(
    'select id, instrument, instrument_version, state, submitted_at::text, answers from questionnaire_response where visit_id = ? order by instrument',
    [visitId],
  );
  return rows.map(({ id, instrument, instrument_version: version, state, submitted_at: at, answers }) => {
    const found = findQuestionnaire(instrument, version);
    const given = state === 'submitted' && found ? elementsOf(found.survey).filter(({ name }) => name in answers) : [];
    return {
      id,
      title: found?.title ?? instrument,
      state,
      submittedAt: at === null ? null : moment(at).toISOString(),
      answers: given.map((element) => ({ item: element.name, question: element.title.default, answer: inWords(element, answers[element.name]) })),
    };
  });
}
