'use client';
import dynamic from 'next/dynamic';

/** The survey engine is large, so only this page fetches it, and only in the browser. */
export const LazySurvey = dynamic(() => import('./answer-questionnaire').then(({ AnswerQuestionnaire }) => AnswerQuestionnaire), {
  ssr: false,
  loading: () => (
    <div className="phone on-phone">
      <main id="main" className="phone-body">
        <p role="status">Opening the questions…</p>
      </main>
    </div>
  ),
});
