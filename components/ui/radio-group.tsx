import type { ComponentProps, ReactNode } from 'react';
import { FieldSet, type FieldWords } from './field';

export interface RadioChoice {
  value: string;
  label: ReactNode;
}

export interface RadioGroupProps
  extends FieldWords,
    Omit<ComponentProps<'input'>, 'type' | 'size' | 'disabled' | 'value' | 'defaultValue'> {
  name: string;
  choices: readonly RadioChoice[];
  /** The chosen value, when the caller keeps it. */
  value?: string | null;
  /** The value chosen at first, when the browser keeps it (react-hook-form). */
  defaultValue?: string;
  /** Plain rounds, the same in one line for a word or two each, phone tiles one under another, or a row of two to four tiles. */
  as?: 'rounds' | 'line' | 'tiles' | 'row';
  className?: string;
}

const frames = { rounds: 'picks', line: 'picks picks-line', tiles: 'picks', row: 'tiles-row' } as const;

/** One answer out of a few that all stay in sight. */
export function RadioGroup({
  label,
  hint,
  error,
  optional,
  labelHidden,
  choices,
  value,
  defaultValue,
  as = 'rounds',
  id,
  className,
  ...rest
}: RadioGroupProps) {
  return (
    <FieldSet {...{ label, hint, error, optional, labelHidden, id, className }}>
      <div className={frames[as]}>
        {choices.map((choice) => (
          <label key={choice.value} className={as === 'rounds' || as === 'line' ? 'pick' : 'tile'}>
            <input
              {...rest}
              type="radio"
              className="rad"
              value={choice.value}
              {...(value === undefined ? {} : { checked: value === choice.value })}
              {...(defaultValue === undefined ? {} : { defaultChecked: defaultValue === choice.value })}
            />
            <span>{choice.label}</span>
          </label>
        ))}
      </div>
    </FieldSet>
  );
}
