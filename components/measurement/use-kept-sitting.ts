'use client';

import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { ProblemError, send } from '../api/send';

export type AnyAssessment = OpenAssessmentView | CompleteAssessmentView;

/** One part of the form that is saved by itself: a column of the grid, or what stands beside the tape. */
export interface FormPart {
  readonly key: string;
  readonly path: string;
  readonly body: object;
}

export type KeptState =
  | { readonly kind: 'kept'; readonly at: Date | null }
  | { readonly kind: 'saving' }
  | { readonly kind: 'failed'; readonly sentence: string }
  | { readonly kind: 'conflict'; readonly theirs: OpenAssessmentView };

const contentOf = (part: FormPart): string => JSON.stringify(part.body);
const pauseMs = 1500;
const retryMs = 30_000;

interface KeptSitting {
  view: OpenAssessmentView;
  /** The form now, in parts. */
  parts: readonly FormPart[];
  /** The parts of a form as the server has it. */
  partsOf: (view: AnyAssessment) => readonly FormPart[];
  /** Somebody (perhaps we, and the answer was lost) has saved the whole as complete. */
  onComplete: (view: CompleteAssessmentView) => void;
}

/**
 * Keeps an open sitting on the server while it is typed: each changed part after a pause, one after another under the
 * version the server last gave. Nothing typed is ever lost here: a lost line is tried again, a lost answer is
 * recognised by its content, and another person's saving is shown before anything is written over.
 */
export function useKeptSitting({ view, parts, partsOf, onComplete }: KeptSitting) {
  const [state, setState] = useState<KeptState>({ kind: 'kept', at: null });
  const version = useRef(view.version);
  const saved = useRef<Map<string, string> | null>(null);
  const latest = useRef(parts);
  const queue = useRef<Promise<boolean>>(Promise.resolve(true));
  const contents = useMemo(() => parts.map(contentOf).join('\n'), [parts]);

  const adopt = useCallback(
    (theirs: AnyAssessment) => {
      version.current = theirs.version;
      saved.current = new Map(partsOf(theirs).map((part) => [part.key, contentOf(part)]));
    },
    [partsOf],
  );

  const run = useCallback(async (): Promise<boolean> => {
    for (;;) {
      const known = saved.current ?? new Map<string, string>();
      const part = latest.current.find((one) => known.get(one.key) !== contentOf(one));
      if (!part) return true;
      setState({ kind: 'saving' });
      try {
        const answer = await send<OpenAssessmentView>('PUT', part.path, part.body, { version: version.current });
        version.current = answer.version;
        known.set(part.key, contentOf(part));
        saved.current = known;
        setState({ kind: 'kept', at: new Date() });
      } catch (error) {
        if (!(error instanceof ProblemError)) throw error;
        if (error.problem.code !== 'stale' && error.problem.code !== 'locked') {
          setState({ kind: 'failed', sentence: error.problem.detail });
          return false;
        }
        const theirs = await send<AnyAssessment>('GET', `/api/visits/${view.visitId}/assessment`).catch(() => null);
        if (theirs === null) {
          setState({ kind: 'failed', sentence: error.problem.detail });
          return false;
        }
        if (theirs.state === 'complete') {
          onComplete(theirs);
          return false;
        }
        const isOurs = partsOf(theirs).every((one) => known.get(one.key) === contentOf(one) || (one.key === part.key && contentOf(one) === contentOf(part)));
        if (!isOurs) {
          setState({ kind: 'conflict', theirs });
          return false;
        }
        adopt(theirs);
      }
    }
  }, [adopt, onComplete, partsOf, view.visitId]);

  /** Saves what is not saved yet; true once all of it is. */
  const flush = useCallback((): Promise<boolean> => {
    queue.current = queue.current.then(run, run);
    return queue.current;
  }, [run]);

  useEffect(() => {
    latest.current = parts;
    saved.current ??= new Map(partsOf(view).map((part) => [part.key, contentOf(part)]));
  }, [parts, partsOf, view]);
  useEffect(() => {
    const timer = setTimeout(() => void flush(), pauseMs);
    return () => clearTimeout(timer);
  }, [contents, flush]);
  useEffect(() => {
    if (state.kind !== 'failed') return;
    const timer = setTimeout(() => void flush(), retryMs);
    return () => clearTimeout(timer);
  }, [state, flush]);
  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => {
      if (latest.current.some((part) => saved.current?.get(part.key) !== contentOf(part))) event.preventDefault();
    };
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, []);

  /** After a conflict: writes this form over theirs, or goes on from theirs. */
  const settle = useCallback(
    (theirs: OpenAssessmentView) => {
      adopt(theirs);
      setState({ kind: 'kept', at: null });
    },
    [adopt],
  );
  const complete = useCallback(
    (kept: readonly { check: string; place: string; reason: string }[]) =>
      send<CompleteAssessmentView>('POST', `/api/assessments/${view.id}/complete`, { kept }, { version: version.current }),
    [view.id],
  );
  return { state, flush, settle, complete };
}
