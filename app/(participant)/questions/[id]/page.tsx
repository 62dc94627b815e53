import type { Metadata } from 'next';
import { z } from 'zod';
import { notFound } from 'next/navigation';
import { QuestionnaireTask } from '@/components/questionnaire/questionnaire-task';
import { viewQuestionnaire } from '@/lib/questionnaires/view-questionnaire';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Questions' };

export default async function QuestionnairePage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  if (!z.uuid().safeParse(id).success) notFound();
  const questionnaire = await loadPage('questionnaire.view', (work) => viewQuestionnaire(work, { id }));
  return <QuestionnaireTask key={id} questionnaire={questionnaire} />;
}
