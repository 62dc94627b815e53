'use client';

import { useEffect, useRef, useState, type KeyboardEvent } from 'react';
import { FieldError, useJoined, type FieldWords } from './field';
import { readNumber } from './read-number';
import { Verb } from './verbs';

export interface StepperProps extends Omit<FieldWords, 'optional'> {
  id?: string;
  value: number;
  onChange: (value: number) => void;
  step?: number;
  min?: number;
  max?: number;
  unit?: string;
  /** Decimals shown; 1 for loads in half kilograms. */
  decimals?: number;
  /** Large: the one figure of a phone screen. Small: a line with its label at the left. */
  size?: 'large' | 'small';
  /** Past the rule: the figure turns to needs. Say why in `error` or beside. */
  outside?: boolean;
  /** Hears whether what was typed last could not be taken; the figure stands as it was before. */
  onFault?: (isFaulty: boolean) => void;
}

const holdMs = 450;
const repeatMs = 110;

/** A figure with less and more. A press and hold repeats; the figure itself can be typed; arrow keys step. */
export function Stepper({
  label,
  labelHidden,
  hint,
  error,
  id,
  value,
  onChange,
  step = 1,
  min = 0,
  max = 999,
  unit,
  decimals = 0,
  size = 'large',
  outside,
  onFault,
}: StepperProps) {
  const [fault, setFault] = useState<string | null>(null);
  const { hintId, errorId, ...joined } = useJoined({ hint, error: fault ?? error }, id);
  const told = (sentence: string | null) => {
    setFault(sentence);
    onFault?.(sentence !== null);
  };
  const move = (by: number) => {
    told(null);
    onChange(within(roundTo(value + by * step, step), min, max));
  };
  const small = size === 'small';
  const labelled = (
    <label htmlFor={joined.id} className={labelHidden ? 'sr-only' : small ? 't-participant' : 'field-label'}>
      {label}
      {unit ? <span className="sr-only">, in {unit}</span> : null}
    </label>
  );
  return (
    <div className="field">
      {small ? null : labelled}
      <div className={`stepper ${small ? 'stepper-small' : ''}`}>
        {small ? labelled : null}
        <HoldKey verb="less" label="Less" describedBy={joined.id} onStep={() => move(-1)} />
        <Figure {...{ joined, value, onChange, move, min, max, decimals, unit, outside, told }} />
        <HoldKey verb="add" label="More" describedBy={joined.id} onStep={() => move(1)} />
      </div>
      {hint ? (
        <p id={hintId} className="field-hint mt-1">
          {hint}
        </p>
      ) : null}
      <FieldError id={errorId}>{fault ?? error}</FieldError>
    </div>
  );
}

interface FigureProps extends Pick<StepperProps, 'value' | 'onChange' | 'unit' | 'outside'> {
  joined: object;
  move: (by: number) => void;
  min: number;
  max: number;
  decimals: number;
  told: (sentence: string | null) => void;
}

/** While it is typed the words stand as typed; on leaving they become the figure. What cannot be taken is said, and the last figure stands. */
function Figure({ joined, value, onChange, move, min, max, decimals, unit, outside, told }: FigureProps) {
  const [typed, setTyped] = useState<string | null>(null);
  const settle = () => {
    if (typed === null) return;
    const read = readNumber(typed);
    const measure = unit ? ` ${unit}` : '';
    const stays = `It stays at ${value.toFixed(decimals)}${measure} until you type another.`;
    setTyped(null);
    if (read.kind === 'unclear') return told(`${read.sentence} ${stays}`);
    if (read.kind === 'number' && (read.value < min || read.value > max)) return told(`You typed ${typed.trim()}; ${min} to ${max}${measure} can be kept. ${stays}`);
    told(null);
    if (read.kind === 'number') onChange(read.value);
  };
  const key = (event: KeyboardEvent) => {
    if (event.key !== 'ArrowUp' && event.key !== 'ArrowDown') return;
    event.preventDefault();
    move(event.key === 'ArrowUp' ? 1 : -1);
  };
  return (
    <span className={`stepper-figure ${outside ? 'stepper-needs' : ''}`}>
      <input
        {...joined}
        inputMode="decimal"
        autoComplete="off"
        size={4}
        value={typed ?? value.toFixed(decimals)}
        onFocus={(event) => event.target.select()}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={settle}
        onKeyDown={key}
      />
      {unit ? <span aria-hidden="true">{unit}</span> : null}
    </span>
  );
}

interface HoldKeyProps {
  verb: 'less' | 'add';
  label: string;
  describedBy: string;
  onStep: () => void;
}

function HoldKey({ verb, label, describedBy, onStep }: HoldKeyProps) {
  const latest = useRef(onStep);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const repeated = useRef(false);
  useEffect(() => {
    latest.current = onStep;
  }, [onStep]);
  useEffect(() => () => clearTimeout(timer.current), []);
  const again = () => {
    repeated.current = true;
    latest.current();
    timer.current = setTimeout(again, repeatMs);
  };
  const press = () => {
    repeated.current = false;
    timer.current = setTimeout(again, holdMs);
  };
  const release = () => clearTimeout(timer.current);
  const click = () => {
    if (!repeated.current) onStep();
    repeated.current = false;
  };
  return (
    <button
      type="button"
      className="stepper-key"
      aria-label={label}
      aria-controls={describedBy}
      onPointerDown={press}
      onPointerUp={release}
      onPointerLeave={release}
      onPointerCancel={release}
      onContextMenu={(event) => event.preventDefault()}
      onClick={click}
    >
      <Verb name={verb} size={24} />
    </button>
  );
}

/** Sums of half kilograms stay half kilograms. */
function roundTo(value: number, step: number): number {
  const decimals = (String(step).split('.')[1] ?? '').length;
  return Number(value.toFixed(decimals));
}

function within(value: number, min: number, max: number): number {
  return Math.min(max, Math.max(min, value));
}
