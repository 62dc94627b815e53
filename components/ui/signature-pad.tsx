'use client';

import { useRef, useState, type PointerEvent } from 'react';
import { Button } from './button';
import { FieldError, useJoined } from './field';
import { TextField } from './text-field';

/** What the hand made. A drawing is an SVG path on a field of `width` by `height`; typing is always open to everyone. */
export type SignatureMade = { kind: 'drawn'; path: string; width: number; height: number } | { kind: 'typed'; name: string };

export interface SignaturePadProps {
  /** 'Sign with a finger' unless said. */
  label?: string;
  /** Stands at the foot, as the moment of signing. */
  stamp?: string;
  onChange: (signature: SignatureMade | null) => void;
  error?: string | undefined;
}

/** Draw or type: a drag that cannot be made has a way by keyboard. */
export function SignaturePad({ label = 'Sign with a finger', stamp, onChange, error }: SignaturePadProps) {
  const [typing, setTyping] = useState(false);
  const swap = () => {
    setTyping(!typing);
    onChange(null);
  };
  return (
    <div>
      {typing ? (
        <TextField
          label="Type your full name as your signature"
          autoComplete="name"
          error={error}
          onChange={(event) => onChange(event.target.value.trim() ? { kind: 'typed', name: event.target.value.trim() } : null)}
        />
      ) : (
        <DrawField {...{ label, stamp, onChange, error }} />
      )}
      <p className="mt-1 text-ink-2">
        {typing ? 'Rather draw? ' : 'Cannot draw? '}
        <Button kind="link" className="pad-44" onClick={swap}>
          {typing ? 'Sign with a finger instead' : 'Type your name instead'}
        </Button>
      </p>
    </div>
  );
}

function DrawField({ label, stamp, onChange, error }: SignaturePadProps) {
  const [strokes, setStrokes] = useState<readonly string[]>([]);
  const current = useRef('');
  const { id, errorId } = useJoined({ error });
  const point = (event: PointerEvent<SVGSVGElement>) => {
    const { left, top, width, height } = event.currentTarget.getBoundingClientRect();
    // The pen may slip over the edge; the drawing ends there.
    const within = (at: number, most: number) => Math.min(Math.max(at, 0), Math.round(most)).toFixed(1);
    return `${within(event.clientX - left, width)} ${within(event.clientY - top, height)}`;
  };
  const start = (event: PointerEvent<SVGSVGElement>) => {
    event.currentTarget.setPointerCapture(event.pointerId);
    current.current = `M${point(event)}`;
    setStrokes((all) => [...all, current.current]);
  };
  const move = (event: PointerEvent<SVGSVGElement>) => {
    if (!current.current) return;
    current.current += `L${point(event)}`;
    setStrokes((all) => [...all.slice(0, -1), current.current]);
  };
  const end = (event: PointerEvent<SVGSVGElement>) => {
    if (!current.current) return;
    current.current = '';
    const { width, height } = event.currentTarget.getBoundingClientRect();
    const path = strokes.join('');
    onChange(path.includes('L') ? { kind: 'drawn', path, width: Math.round(width), height: Math.round(height) } : null);
  };
  const clear = () => {
    setStrokes([]);
    onChange(null);
  };
  return (
    <div className="field">
      <p id={id} className="field-label">
        {label}
      </p>
      <div className={`signature ${error ? 'box-error' : ''}`}>
        <svg
          role="img"
          aria-labelledby={id}
          aria-describedby={error ? errorId : undefined}
          onPointerDown={start}
          onPointerMove={move}
          onPointerUp={end}
          onPointerCancel={end}
        >
          <path d={strokes.join('')} fill="none" stroke="var(--ink)" strokeWidth="2.4" strokeLinecap="round" strokeLinejoin="round" />
        </svg>
        <div className="signature-foot">
          <span>{stamp}</span>
          <Button kind="link" onClick={clear}>
            Clear
          </Button>
        </div>
      </div>
      <FieldError id={errorId}>{error}</FieldError>
    </div>
  );
}
