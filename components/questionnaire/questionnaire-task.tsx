'use client';
import { useState } from 'react';
import type { QuestionnaireView } from '@/lib/questionnaires/view-questionnaire';
import { ClosedQuestionnaire } from './closed-questionnaire';
import { LazySurvey } from './lazy-survey';

/** Open or closed as it was on arrival: sending closes it, and what is said after sending must stay in sight. */
export function QuestionnaireTask({ questionnaire }: { questionnaire: QuestionnaireView }) {
  const [wasOpen] = useState(questionnaire.isOpen);
  return wasOpen ? <LazySurvey questionnaire={questionnaire} /> : <ClosedQuestionnaire questionnaire={questionnaire} />;
}
