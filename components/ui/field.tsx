import { CircleAlert } from 'lucide-react';
import { useId, type ReactNode } from 'react';

/** What every control carries: it cannot be built without a label. */
export interface FieldWords {
  label: ReactNode;
  /** One line under the label: where the value comes from, or how to give it. */
  hint?: ReactNode;
  /** What is wrong, with the value, then the way out. */
  error?: string | undefined;
  /** Say '(you may leave this out)' after the label. */
  optional?: boolean;
  /** The label is there for a reader only; the page shows it in another way. */
  labelHidden?: boolean;
}

export interface JoinedIds {
  id: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
}

/** Ids that join a control to its hint and error, whichever of them exist. */
export function useJoined(
  { hint, error }: Pick<FieldWords, 'hint' | 'error'>,
  givenId?: string,
): JoinedIds & { hintId: string; errorId: string } {
  const made = useId();
  const id = givenId ?? made;
  const hintId = `${id}-hint`;
  const errorId = `${id}-error`;
  const parts = [hint ? hintId : null, error ? errorId : null].filter(Boolean);
  return { id, hintId, errorId, 'aria-describedby': parts.length ? parts.join(' ') : undefined, 'aria-invalid': error ? true : undefined };
}

export interface FieldProps extends FieldWords {
  id?: string | undefined;
  className?: string | undefined;
  children: (joined: JoinedIds) => ReactNode;
}

/** The frame of one control: label, hint, control, error, joined for a reader. */
export function Field({ label, hint, error, optional, labelHidden, id, className, children }: FieldProps) {
  const { hintId, errorId, ...joined } = useJoined({ hint, error }, id);
  return (
    <div className={`field ${className ?? ''}`}>
      <label htmlFor={joined.id} className={labelHidden ? 'sr-only' : 'field-label'}>
        {label}
        {optional ? <Optional /> : null}
      </label>
      {hint ? (
        <p id={hintId} className="field-hint">
          {hint}
        </p>
      ) : null}
      {children(joined)}
      <FieldError id={errorId}>{error}</FieldError>
    </div>
  );
}

/** The words that mark a field which may stay empty. */
export function Optional() {
  return <span className="font-normal text-ink-2"> (you may leave this out)</span>;
}

/** The sentence under a control that holds something wrong; nothing when all is well. */
export function FieldError({ id, children }: { id: string; children: string | undefined }) {
  if (!children) return null;
  return (
    <p id={id} className="field-error">
      <CircleAlert size={16} strokeWidth={1.9} strokeLinecap="square" strokeLinejoin="miter" aria-hidden="true" />
      <span>{children}</span>
    </p>
  );
}

export interface FieldSetProps extends FieldWords {
  id?: string | undefined;
  className?: string | undefined;
  children: ReactNode;
}

/** The frame of a group of ticks or rounds: the label is the group's legend. */
export function FieldSet({ label, hint, error, optional, labelHidden, id, className, children }: FieldSetProps) {
  const { hintId, errorId, ...joined } = useJoined({ hint, error }, id);
  return (
    <fieldset
      id={joined.id}
      tabIndex={-1}
      className={`field ${error ? 'pick-error' : ''} ${className ?? ''}`}
      aria-describedby={joined['aria-describedby']}
      aria-invalid={joined['aria-invalid']}
    >
      <legend className={labelHidden ? 'sr-only' : 'field-label'}>
        {label}
        {optional ? <Optional /> : null}
      </legend>
      {hint ? (
        <p id={hintId} className="field-hint">
          {hint}
        </p>
      ) : null}
      {children}
      <FieldError id={errorId}>{error}</FieldError>
    </fieldset>
  );
}
