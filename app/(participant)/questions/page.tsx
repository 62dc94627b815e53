import type { Metadata } from 'next';
import { QuestionList } from '@/components/questionnaire/question-list';
import { listQuestionnaires } from '@/lib/questionnaires/list-questionnaires';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Questions' };

export default async function QuestionsPage() {
  return <QuestionList list={await loadPage('questionnaire.list', listQuestionnaires)} />;
}
