import type { ComponentProps } from 'react';
import { Field, type FieldWords } from './field';

export interface NumberFieldProps extends FieldWords, Omit<ComponentProps<'input'>, 'size' | 'type' | 'disabled'> {
  /** Always said: a figure without its unit is a guess. Use '' for a pure count. */
  unit: string;
  className?: string;
}

/**
 * A figure with its unit. The box is text with a numeric keypad, so that a
 * decimal comma or a slip reaches `readNumber` and is answered in words,
 * instead of vanishing in the browser's own number control.
 */
export function NumberField({ label, hint, error, optional, labelHidden, unit, id, className, ...rest }: NumberFieldProps) {
  return (
    <Field {...{ label: <WithUnit label={label} unit={unit} />, hint, error, optional, labelHidden, id, className }}>
      {(joined) => (
        <span className={`box box-num ${error ? 'box-error' : ''}`}>
          <input inputMode="decimal" autoComplete="off" {...rest} {...joined} type="text" />
          {unit ? (
            <span className="box-unit" aria-hidden="true">
              {unit}
            </span>
          ) : null}
        </span>
      )}
    </Field>
  );
}

/** A reader hears the unit with the label; the eye sees it in the box. */
function WithUnit({ label, unit }: { label: FieldWords['label']; unit: string }) {
  return (
    <>
      {label}
      {unit ? <span className="sr-only">, in {unit}</span> : null}
    </>
  );
}
