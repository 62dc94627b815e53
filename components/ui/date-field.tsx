import type { ComponentProps } from 'react';
import { Field, type FieldWords } from './field';

export interface DateFieldProps extends FieldWords, Omit<ComponentProps<'input'>, 'size' | 'type' | 'disabled'> {
  /** Day only, or day and time of day (local to the site). */
  withTime?: boolean;
  className?: string;
}

/** A day as `yyyy-mm-dd` (with time `yyyy-mm-ddThh:mm`); the browser shows it in the reader's own order. */
export function DateField({ label, hint, error, optional, labelHidden, withTime, id, className, ...rest }: DateFieldProps) {
  return (
    <Field {...{ label, hint, error, optional, labelHidden, id, className }}>
      {(joined) => (
        <span className={`box ${error ? 'box-error' : ''}`}>
          <input {...rest} {...joined} type={withTime ? 'datetime-local' : 'date'} />
        </span>
      )}
    </Field>
  );
}
