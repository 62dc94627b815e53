'use client';

import { useEffect, useRef } from 'react';

export interface Problem {
  /** Id of the control; the line then leads to it. */
  fieldId?: string;
  sentence: string;
}

export interface ErrorSummaryProps {
  problems: readonly Problem[];
  /** 'Three things to mend before this can be saved' is made from the count when not said. */
  title?: string;
}

/** What stands in the way, in one place, each line leading to its field. It takes focus whenever its words change. */
export function ErrorSummary({ problems, title }: ErrorSummaryProps) {
  const box = useRef<HTMLDivElement>(null);
  const said = problems.map((problem) => problem.sentence).join('\n');
  useEffect(() => {
    if (said) box.current?.focus();
  }, [said]);
  if (problems.length === 0) return null;
  return (
    <div ref={box} role="alert" tabIndex={-1} className="error-summary">
      <h2 className="t-small-head">{title ?? defaultTitle(problems.length)}</h2>
      <ul>
        {problems.map(({ fieldId, sentence }) => (
          <li key={`${fieldId ?? ''}${sentence}`}>
            {fieldId ? (
              <a href={`#${fieldId}`} onClick={(event) => goTo(event, fieldId)}>
                {sentence}
              </a>
            ) : (
              sentence
            )}
          </li>
        ))}
      </ul>
    </div>
  );
}

function defaultTitle(count: number): string {
  return count === 1 ? 'One thing to mend first' : `${count} things to mend first`;
}

function goTo(event: { preventDefault: () => void }, fieldId: string): void {
  const field = document.getElementById(fieldId);
  if (!field) return;
  event.preventDefault();
  field.focus();
  field.scrollIntoView({ block: 'center' });
}
