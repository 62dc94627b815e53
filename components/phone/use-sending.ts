'use client';
import { useCallback, useEffect, useRef, useState } from 'react';
import { ProblemError, send, type ProblemDetails, type SendOptions } from '../api/send';

const retryMs = 30_000;

/** FNV-1a, 32 bits in hex: tells one content from another under one key. */
function fingerprint(text: string): string {
  let hash = 0x811c9dc5;
  for (let index = 0; index < text.length; index += 1) hash = Math.imul(hash ^ text.charCodeAt(index), 0x01000193);
  return (hash >>> 0).toString(16).padStart(8, '0');
}

export interface Sending<Answer> {
  readonly atWork: boolean;
  readonly problem: ProblemDetails | null;
  /** The line is gone: what was typed is kept here and tried again by itself. */
  readonly isWaiting: boolean;
  readonly start: (body: object) => Promise<Answer | null>;
  readonly clear: () => void;
}

/**
 * One create under one key, kept over presses and retries. Without a connection it is tried again every 30 seconds
 * and as soon as the line is back; `onDone` hears of the one success. `resume` is what an earlier visit had begun to send under the same key.
 */
export function useSending<Answer>(path: string, key: string, onDone: (answer: Answer) => void, resume: object | null = null): Sending<Answer> {
  const [state, setState] = useState<{ atWork: boolean; problem: ProblemDetails | null }>({ atWork: false, problem: null });
  const waiting = useRef<object | null>(null);
  const running = useRef(false);
  const done = useRef(onDone);
  useEffect(() => {
    done.current = onDone;
  }, [onDone]);

  const start = useCallback(
    async (body: object): Promise<Answer | null> => {
      if (running.current) return null;
      running.current = true;
      setState({ atWork: true, problem: null });
      try {
        // The same words sent again are the same request; other words, after an answer of ours that got lost, are another.
        const options: SendOptions = { idempotencyKey: `${key}-${fingerprint(JSON.stringify(body))}` };
        const answer = await send<Answer>('POST', path, body, options);
        waiting.current = null;
        setState({ atWork: false, problem: null });
        done.current(answer);
        return answer;
      } catch (error) {
        if (!(error instanceof ProblemError)) throw error;
        waiting.current = error.problem.code === 'no-connection' ? body : null;
        setState({ atWork: false, problem: error.problem });
        return null;
      } finally {
        running.current = false;
      }
    },
    [path, key],
  );

  const isWaiting = state.problem?.code === 'no-connection';
  useEffect(() => {
    if (!isWaiting) return;
    const again = () => {
      if (waiting.current) void start(waiting.current);
    };
    const timer = setInterval(again, retryMs);
    window.addEventListener('online', again);
    return () => {
      clearInterval(timer);
      window.removeEventListener('online', again);
    };
  }, [isWaiting, start]);

  const toResume = useRef(resume);
  useEffect(() => {
    const body = toResume.current;
    toResume.current = null;
    if (body) void start(body);
  }, [start]);

  const clear = useCallback(() => setState({ atWork: false, problem: null }), []);
  return { ...state, isWaiting, start, clear };
}

/** Asks before the page is left while something typed is not saved. */
export function useKeepOpen(isUnsaved: boolean): void {
  useEffect(() => {
    if (!isUnsaved) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [isUnsaved]);
}
