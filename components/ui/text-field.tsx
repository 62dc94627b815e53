import type { ComponentProps, ReactNode } from 'react';
import { Field, type FieldWords } from './field';

export interface TextFieldProps extends FieldWords, Omit<ComponentProps<'input'>, 'size' | 'disabled'> {
  /** Stands inside the box at its right, as 'kg'. */
  unit?: ReactNode;
  /** Classes of the whole field; the control itself takes none. */
  className?: string;
}

/** One line of words. Takes what react-hook-form's `register` returns. */
export function TextField({ label, hint, error, optional, labelHidden, unit, id, className, type = 'text', ...rest }: TextFieldProps) {
  return (
    <Field {...{ label, hint, error, optional, labelHidden, id, className }}>
      {(joined) => (
        <span className={`box ${error ? 'box-error' : ''}`}>
          <input {...rest} {...joined} type={type} />
          {unit ? <span className="box-unit">{unit}</span> : null}
        </span>
      )}
    </Field>
  );
}
