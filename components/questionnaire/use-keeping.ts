'use client';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { QuestionnaireView } from '@/lib/questionnaires/view-questionnaire';
import { ProblemError, send, type ProblemDetails } from '../api/send';

type Answers = Record<string, number | string>;

const retryMs = 30_000;

/** Keeps answers on the server page by page, one save after the other, each from the version the last one left. */
export function useKeeping(questionnaire: QuestionnaireView) {
  const version = useRef(questionnaire.version);
  const line = useRef<Promise<unknown>>(Promise.resolve());
  const waiting = useRef<{ answers: Answers; page: number } | null>(null);
  const [problem, setProblem] = useState<ProblemDetails | null>(null);
  const path = `/api/questionnaires/${questionnaire.id}`;

  const inLine = useCallback(<T,>(call: () => Promise<T>): Promise<T | null> => {
    const next = line.current.then(async () => {
      try {
        const answer = await call();
        setProblem(null);
        return answer;
      } catch (error) {
        if (!(error instanceof ProblemError)) throw error;
        setProblem(error.problem);
        return null;
      }
    });
    line.current = next;
    return next;
  }, []);

  const keep = useCallback(
    (answers: Answers, page: number) => {
      waiting.current = { answers, page };
      return inLine(async () => {
        const kept = await send<QuestionnaireView>('PUT', path, { answers, page }, { version: version.current });
        version.current = kept.version;
        if (waiting.current?.answers === answers) waiting.current = null;
        return kept;
      });
    },
    [inLine, path],
  );

  const submit = useCallback(
    <T extends { version: number }>(answers: Answers) =>
      inLine(async () => {
        const sent = await send<T>('POST', `${path}/submit`, { answers }, { version: version.current });
        version.current = sent.version;
        waiting.current = null;
        return sent;
      }),
    [inLine, path],
  );

  const isWaiting = problem?.code === 'no-connection';
  useEffect(() => {
    if (!isWaiting) return;
    const again = () => {
      if (waiting.current) void keep(waiting.current.answers, waiting.current.page);
    };
    const timer = setInterval(again, retryMs);
    window.addEventListener('online', again);
    return () => {
      clearInterval(timer);
      window.removeEventListener('online', again);
    };
  }, [isWaiting, keep]);

  return { keep, submit, problem };
}
