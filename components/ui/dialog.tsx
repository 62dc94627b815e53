'use client';

import { useEffect, useId, useLayoutEffect, useRef, type ReactNode } from 'react';

export interface DialogProps {
  open: boolean;
  /** Called for Escape too; the caller then sets `open` to false. */
  onClose: () => void;
  /** The question. The buttons are its answers. */
  title: string;
  children?: ReactNode;
  /** Buttons, the main answer first. */
  actions: ReactNode;
  /** A sheet from the foot of a phone's screen, with a needs edge: advice about a jump. */
  as?: 'dialog' | 'sheet';
}

/** For what cannot be undone or must be signed. The browser's own modal, so focus stays inside and returns after. */
export function Dialog({ open, onClose, title, children, actions, as = 'dialog' }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (!dialog || dialog.open === open) return;
    if (open) dialog.showModal();
    else dialog.close();
  }, [open]);
  // Taken from the page while open it would not give the focus back; closed first, it does.
  useLayoutEffect(() => {
    const dialog = ref.current;
    return () => dialog?.close();
  }, []);
  return (
    <dialog
      ref={ref}
      className={as === 'sheet' ? 'dialog sheet-dialog' : 'dialog'}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
    >
      {open ? (
        <>
          <h2 id={titleId}>{title}</h2>
          <div className="mt-2">{children}</div>
          <div className="dialog-actions">{actions}</div>
        </>
      ) : null}
    </dialog>
  );
}
