import type { ComponentProps, ReactNode } from 'react';
import { FieldError, useJoined, type FieldWords } from './field';

export interface CheckboxProps extends Pick<FieldWords, 'hint' | 'error'>, Omit<ComponentProps<'input'>, 'type' | 'size' | 'disabled'> {
  label: ReactNode;
  /** Phone form: the whole line is a 56 px target. */
  tile?: boolean;
  className?: string;
}

/** One statement to agree to. */
export function Checkbox({ label, hint, error, tile, id, className, ...rest }: CheckboxProps) {
  const { hintId, errorId, ...joined } = useJoined({ hint, error }, id);
  return (
    <div className={`${error ? 'pick-error' : ''} ${className ?? ''}`}>
      <label className={tile ? 'tile' : 'pick'}>
        <input {...rest} {...joined} type="checkbox" className="chk" />
        <span>{label}</span>
      </label>
      {hint ? (
        <p id={hintId} className="field-hint mt-1 ml-7">
          {hint}
        </p>
      ) : null}
      <FieldError id={errorId}>{error}</FieldError>
    </div>
  );
}
