import type { QuestionnaireView } from '@/lib/questionnaires/view-questionnaire';
import { TaskFrame } from '../phone/frame';
import { formatDate } from '../ui/format';

/** Not open: sent, not yet open, or past its window; in a sentence. */
export function ClosedQuestionnaire({ questionnaire: { title, state, opensOn, closesOn } }: { questionnaire: QuestionnaireView }) {
  return (
    <TaskFrame back={{ href: '/questions', title }}>
      <h1>{title}</h1>
      <p className="phone-lede">
        {state === 'submitted'
          ? 'Your answers are in and closed. To correct one, ask your site.'
          : `Open from ${formatDate(opensOn)} to ${formatDate(closesOn)}. Answers are taken in that time only.`}
      </p>
    </TaskFrame>
  );
}
