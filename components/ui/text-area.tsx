import type { ComponentProps } from 'react';
import { Field, type FieldWords } from './field';

export interface TextAreaProps extends FieldWords, Omit<ComponentProps<'textarea'>, 'disabled'> {
  /** The monitor's words are set in the monitor's hand. */
  hand?: boolean;
  className?: string;
}

/** Several lines of words. */
export function TextArea({ label, hint, error, optional, labelHidden, hand, id, className, rows = 3, ...rest }: TextAreaProps) {
  return (
    <Field {...{ label, hint, error, optional, labelHidden, id, className }}>
      {(joined) => (
        <span className={`box ${error ? 'box-error' : ''} ${hand ? 'border-note' : ''}`}>
          <textarea {...rest} {...joined} rows={rows} className={hand ? 't-hand' : undefined} />
        </span>
      )}
    </Field>
  );
}
