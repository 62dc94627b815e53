import type { ComponentProps } from 'react';
import type { Choice } from './select';

export interface ChoiceInSentenceProps extends Omit<ComponentProps<'select'>, 'size' | 'disabled' | 'multiple'> {
  /** What is chosen, for a reader: 'status', 'site'. The sentence says it for the eye. */
  label: string;
  choices: readonly Choice[];
}

/** A filter or setting chosen inside a sentence: 'Queries that are [open] at [all three sites]'. */
export function ChoiceInSentence({ label, choices, className, ...rest }: ChoiceInSentenceProps) {
  return (
    <span className={`in-sentence in-sentence-choice ${className ?? ''}`}>
      <select {...rest} aria-label={label}>
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
      </select>
    </span>
  );
}

export interface ValueInSentenceProps extends Omit<ComponentProps<'input'>, 'disabled'> {
  label: string;
  type?: 'text' | 'date' | 'number';
}

/** A figure, day or word given inside a sentence: 'older than [14] days'. */
export function ValueInSentence({ label, type = 'text', className, ...rest }: ValueInSentenceProps) {
  return (
    <span className={`in-sentence ${className ?? ''}`}>
      <input {...rest} type={type} aria-label={label} />
    </span>
  );
}
