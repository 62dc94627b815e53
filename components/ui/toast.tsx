'use client';

import { createContext, useCallback, useContext, useEffect, useMemo, useState, type ReactNode } from 'react';
import { Button } from './button';

export interface ToastWords {
  /** fine: it is saved; act: something was done; needs: something is wrong and waits for you. */
  kind: 'fine' | 'act' | 'needs';
  /** First word or two, bold: 'Saved.', 'Not saved, no connection.' */
  word: string;
  text?: string;
  action?: { label: string; run: () => void };
}

interface Shown extends ToastWords {
  id: number;
}

type Say = (words: ToastWords) => void;

const Toasts = createContext<Say | null>(null);
const staysMs = 10_000;

/** Says things back at the foot of the page. Stands once, in the root layout. */
export function ToastProvider({ children }: { children: ReactNode }) {
  const [shown, setShown] = useState<{ next: number; list: Shown[] }>({ next: 1, list: [] });
  const say = useCallback<Say>(
    (words) => setShown(({ next, list }) => ({ next: next + 1, list: [...list.slice(-2), { ...words, id: next }] })),
    [],
  );
  const drop = useCallback((id: number) => setShown(({ next, list }) => ({ next, list: list.filter((toast) => toast.id !== id) })), []);
  const said = useMemo(
    () => ({ calm: shown.list.filter((toast) => toast.kind !== 'needs'), urgent: shown.list.filter((toast) => toast.kind === 'needs') }),
    [shown],
  );
  return (
    <Toasts value={say}>
      {children}
      <div className="toasts">
        <div role="status" className="contents">
          {said.calm.map((toast) => (
            <Toast key={toast.id} toast={toast} drop={drop} />
          ))}
        </div>
        <div role="alert" className="contents">
          {said.urgent.map((toast) => (
            <Toast key={toast.id} toast={toast} drop={drop} />
          ))}
        </div>
      </div>
    </Toasts>
  );
}

/** `const { say } = useToast()`; throws when no ToastProvider stands above. */
export function useToast(): { say: Say } {
  const say = useContext(Toasts);
  if (!say) throw new Error('useToast needs a ToastProvider above it.');
  return useMemo(() => ({ say }), [say]);
}

/** Stays ten seconds, longer while pointed at or focused; what went wrong stays until it is dismissed. */
function Toast({ toast, drop }: { toast: Shown; drop: (id: number) => void }) {
  const [held, setHeld] = useState(false);
  const { id, kind, word, text, action } = toast;
  useEffect(() => {
    if (held || kind === 'needs') return;
    const timer = setTimeout(() => drop(id), staysMs);
    return () => clearTimeout(timer);
  }, [held, kind, id, drop]);
  const hold = {
    onPointerEnter: () => setHeld(true),
    onPointerLeave: () => setHeld(false),
    onFocus: () => setHeld(true),
    onBlur: () => setHeld(false),
  };
  return (
    <div className={`toast ${kind === 'act' ? '' : `toast-${kind}`}`} {...hold}>
      <p className="toast-words">
        <b>{word}</b> {text}
      </p>
      {action ? (
        <Button
          kind="link"
          onClick={() => {
            action.run();
            drop(id);
          }}
        >
          {action.label}
        </Button>
      ) : null}
      <Button kind="link" className="!font-normal" onClick={() => drop(id)}>
        Dismiss
      </Button>
    </div>
  );
}
