import type { ComponentProps } from 'react';
import { Field, type FieldWords } from './field';

export interface Choice {
  value: string;
  label: string;
}

export interface SelectProps extends FieldWords, Omit<ComponentProps<'select'>, 'size' | 'disabled' | 'multiple'> {
  choices: readonly Choice[];
  /** First, empty line, as 'Choose a site'. Without it the first choice is taken at once. */
  none?: string;
  className?: string;
}

/** One of a list. The browser's own menu, so that every keyboard and phone knows it. */
export function Select({ label, hint, error, optional, labelHidden, choices, none, id, className, ...rest }: SelectProps) {
  return (
    <Field {...{ label, hint, error, optional, labelHidden, id, className }}>
      {(joined) => (
        <span className={`box box-select ${error ? 'box-error' : ''}`}>
          <select {...rest} {...joined}>
            {none === undefined ? null : <option value="">{none}</option>}
            {choices.map((choice) => (
              <option key={choice.value} value={choice.value}>
                {choice.label}
              </option>
            ))}
          </select>
        </span>
      )}
    </Field>
  );
}
