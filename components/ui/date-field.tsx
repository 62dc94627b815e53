'use client';

import { type ComponentProps, useState } from 'react';
import { Field, type FieldWords } from './field';
import { formatDate } from './format';

export interface DateFieldProps extends FieldWords, Omit<ComponentProps<'input'>, 'size' | 'type' | 'disabled'> {
  /** Day only, or day and time of day (local to the site). */
  withTime?: boolean;
  className?: string;
}

/** '3 Dec 2026', with the time where there is one; nothing while the day is not whole. */
const inFull = (value: string): string => (value === '' ? '' : [formatDate(value.slice(0, 10)), value.slice(11)].filter((part) => part !== '').join(', '));

/**
 * A day as `yyyy-mm-dd` (with time `yyyy-mm-ddThh:mm`). The browser shows it in the order of its own country, which may
 * read month first or day first; so the day stands beside it with its month in letters.
 */
export function DateField({ label, hint, error, optional, labelHidden, withTime, id, className, ref, ...rest }: DateFieldProps) {
  const [shown, setShown] = useState('');
  return (
    <Field {...{ label, hint, error, optional, labelHidden, id, className }}>
      {(joined) => (
        <span className={`box ${error ? 'box-error' : ''}`}>
          <input
            {...rest}
            {...joined}
            type={withTime ? 'datetime-local' : 'date'}
            ref={(element) => {
              if (typeof ref === 'function') ref(element);
              else if (ref) ref.current = element;
              // Whoever keeps the value (the caller, a form library that has just set it, the browser), what the input holds is what is read.
              if (element) setShown(element.value);
            }}
            onChange={(event) => {
              setShown(event.target.value);
              void rest.onChange?.(event);
            }}
          />
          {shown ? (
            <span className="box-unit whitespace-nowrap" aria-hidden="true">
              {inFull(shown)}
            </span>
          ) : null}
        </span>
      )}
    </Field>
  );
}
