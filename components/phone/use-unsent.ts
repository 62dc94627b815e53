'use client';
import { useCallback, useEffect, useRef, useState } from 'react';
import { findUnsent, unsentShape, type Unsent, type UnsentKind } from './unsent';
import { deviceShelf } from './unsent-shelf';

export interface Left<Value> {
  /** What an earlier visit left on this phone; null until it has been read, and when there is nothing. */
  readonly found: Unsent<Value> | null;
  readonly isRead: boolean;
  /** Changes when the form begins anew: the key of the form. */
  readonly form: string;
  /** Removes it and begins anew. */
  readonly forget: () => void;
}

/** Reads what was left unsent. The form shows at once and is made again from what is found, a moment later. */
export function useLeftUnsent<Value>(owner: string, kind: UnsentKind): Left<Value> {
  const [left, setLeft] = useState<{ found: Unsent<Value> | null; isRead: boolean; round: number }>({ found: null, isRead: false, round: 0 });
  useEffect(() => {
    let isGone = false;
    const read = (found: Unsent | null): void => {
      if (!isGone) setLeft({ found: found as Unsent<Value> | null, isRead: true, round: 0 });
    };
    // A device without a shelf has nothing left on it.
    findUnsent(deviceShelf, owner, kind, new Date()).then(read, () => read(null));
    return () => {
      isGone = true;
    };
  }, [owner, kind]);
  const forget = useCallback(() => {
    const anew = (): void => setLeft(({ round }) => ({ found: null, isRead: true, round: round + 1 }));
    // What cannot be removed is written over by the next entry, and swept with the next sign-in.
    deviceShelf.remove(owner, kind).then(anew, anew);
  }, [owner, kind]);
  return { found: left.found, isRead: left.isRead, form: left.found?.key ?? `new ${left.round}`, forget };
}

export interface Keeping {
  readonly owner: string;
  readonly kind: UnsentKind;
  readonly key: string;
  /** What is to be kept now; null when nothing is typed, or the server has it. */
  readonly value: object | null;
  /** Nothing is written before what was left has been read. */
  readonly isRead: boolean;
}

/** Keeps what is typed on this phone, change by change, and removes it when `value` becomes null. True while the phone has the newest. */
export function useKeepUnsent({ owner, kind, key, value, isRead }: Keeping): boolean {
  const [kept, setKept] = useState<string | null>(null);
  const hasEntry = useRef(false);
  const content = value === null ? null : JSON.stringify(value);
  useEffect(() => {
    if (!isRead || (content === null && !hasEntry.current)) return;
    hasEntry.current = content !== null;
    const keep = content === null ? deviceShelf.remove(owner, kind) : deviceShelf.put({ shape: unsentShape, owner, kind, key, keptAt: new Date(), value: JSON.parse(content) as unknown });
    // A device that is full or keeps nothing refuses: the page then says so and asks to stay open.
    keep.then(() => setKept(content), () => setKept(null));
  }, [owner, kind, key, content, isRead]);
  return content !== null && kept === content;
}
