import type { VisitQuestionnaireView } from '@/lib/review/visit-questionnaires';
import { MarginSection } from '../ui/margin-sheet';

const stateWords: Record<VisitQuestionnaireView['state'], string> = {
  due: 'not begun',
  'in progress': 'begun, not yet handed in',
  submitted: 'handed in',
  missed: 'missed',
};

/** The questionnaires of the visit, read only: the participant's own words, each with its question. */
export function QuestionnaireParts({ from, questionnaires, submitted }: { from: number; questionnaires: readonly VisitQuestionnaireView[]; submitted: (at: string) => string }) {
  return questionnaires.map(({ id, title, state, submittedAt, answers }, index) => (
    <MarginSection key={id} no={String(from + index)} title={title} aside={submittedAt ? `handed in ${submitted(submittedAt)}` : stateWords[state]}>
      {answers.map(({ item, question, answer }, line) => (
        <div key={item} className="sheet-row sheet-answer">
          <span />
          <span className="no">
            {from + index}.{line + 1}
          </span>
          <span className="label">{question}</span>
          <span className="value">{answer}</span>
        </div>
      ))}
    </MarginSection>
  ));
}
