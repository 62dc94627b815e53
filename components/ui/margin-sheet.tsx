'use client';

import { useEffect, useRef, type ReactNode } from 'react';
import { placeNotes } from './place-notes';
import { Dash, Tick } from './signs';

/** Paper with a right margin. Notes stand at the line they are about and are tied to it by a hairline; below 1100 px they fold under it. */
export function MarginSheet({ children, label }: { children: ReactNode; label: string }) {
  const sheet = useRef<HTMLElement>(null);
  useEffect(() => {
    const root = sheet.current;
    if (!root) return;
    const place = () => placeNotes(root);
    const watch = new ResizeObserver(place);
    watch.observe(root);
    for (const note of root.querySelectorAll('[data-note-for]')) watch.observe(note);
    void document.fonts.ready.then(place);
    return () => watch.disconnect();
  }, [children]);
  return (
    <section ref={sheet} className="sheet" aria-label={label}>
      <div className="sheet-body">{children}</div>
      <svg className="sheet-leaders" aria-hidden="true" />
    </section>
  );
}

/** A numbered part of the form; `aside` stands at the right of its head. */
export function MarginSection({ no, title, aside, children }: { no: string; title: string; aside?: ReactNode; children: ReactNode }) {
  return (
    <section>
      <div className="sheet-section">
        <span className="no">{no}</span>
        <h3>{title}</h3>
        {aside ? <span className="t-small text-ink-2">{aside}</span> : null}
      </div>
      {children}
    </section>
  );
}

export interface MarginRowProps {
  /** Anchor of its notes. Unique on the page. */
  id: string;
  no: string;
  label: ReactNode;
  /** The value as it stands; struck earlier values before it. */
  children: ReactNode;
  /** Seen at source, not yet, or no sign at all. */
  seen?: boolean | null;
  /** The line a note is being written on. */
  current?: boolean;
  /** Remarks run over several lines in prose. */
  long?: boolean;
  /** The notes about this field, in order. */
  notes?: readonly MarginNoteSpec[];
  /** Replaces the tick or dash, as by a button that marks the value seen. */
  gutter?: ReactNode;
}

export interface MarginNoteSpec {
  key: string;
  node: ReactNode;
}

/** One field of the form with its sign of verification, then its notes. */
export function MarginRow({ id, no, label, children, seen = null, current, long, notes = [], gutter }: MarginRowProps) {
  return (
    <>
      <div className={`sheet-row ${current ? 'sheet-row-now' : ''} ${long ? 'sheet-row-long' : ''}`}>
        <span>{gutter ?? <Seen seen={seen} />}</span>
        <span className="no">{no}</span>
        <span className="label">{label}</span>
        <span className="value">
          <span id={id}>{children}</span>
        </span>
      </div>
      {notes.map(({ key, node }) => (
        <MarginNote key={key} anchorId={id} label={`Note on ${no}`}>
          {node}
        </MarginNote>
      ))}
    </>
  );
}

/** Tick, dash or nothing, with the words read aloud. */
export function Seen({ seen }: { seen: boolean | null }) {
  if (seen === null) return null;
  return seen ? <Tick title="seen at source" /> : <Dash title="not yet seen" />;
}

export interface MarginNoteProps {
  /** Id of the value the note is about: a row's id, or the id of a span in a table cell. */
  anchorId: string;
  /** 'Note on left arm, 24 cm, trial 2'. */
  label: string;
  children: ReactNode;
}

/** A note that is placed beside its anchor. Put it right after the field or table it speaks of. */
export function MarginNote({ anchorId, label, children }: MarginNoteProps) {
  return (
    <aside className="sheet-note" data-note-for={anchorId} aria-label={label}>
      {children}
    </aside>
  );
}
