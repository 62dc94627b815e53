'use client';

import { Button } from '../ui/button';
import { EarlierValue } from '../ui/note';
import { Dash, Tick } from '../ui/signs';
import type { MarginRights } from './query-note';
import { printValue, type ReviewItem } from './review-items';

interface ChosenBarProps {
  item: ReviewItem | null;
  rights: MarginRights;
  onSeen: () => void;
  onWrite: () => void;
  onHistory: () => void;
  onCorrect: () => void;
}

/** What may be done about the chosen value, in words; each verb has its key. */
export function ChosenBar({ item, rights, onSeen, onWrite, onHistory, onCorrect }: ChosenBarProps) {
  return (
    <div className="chosen-bar" role="group" aria-label="The chosen value">
      {item ? (
        <>
          <p>
            <b>{item.label}</b>, {printValue(item.kind, item.value)}
          </p>
          {rights.mark ? (
            <Button kind="link" onClick={onSeen}>
              Mark as seen
            </Button>
          ) : null}
          {rights.raise ? (
            <Button kind="link" onClick={onWrite}>
              Write in the margin
            </Button>
          ) : null}
          {rights.correct ? (
            <Button kind="link" onClick={onCorrect}>
              Correct
            </Button>
          ) : null}
          <Button kind="link" onClick={onHistory}>
            History
          </Button>
        </>
      ) : (
        <p className="text-ink-2">Choose a line or a figure to {rights.mark ? 'mark it, ask about it' : rights.correct ? 'correct it' : 'read'} or see what it held before.</p>
      )}
    </div>
  );
}

/** The signs and the keys. Single keys can be turned off. */
export function Legend({ keysOn, onKeys, rights, hasNext }: { keysOn: boolean; onKeys: () => void; rights: MarginRights; hasNext: boolean }) {
  return (
    <div className="review-legend">
      <span>
        <Tick /> seen at source
      </span>
      <span>
        <Dash /> not yet
      </span>
      <span>
        <EarlierValue>27.4</EarlierValue> earlier value, kept
      </span>
      <span className="review-keys">
        {keysOn ? (
          <>
            Keys: <kbd>j</kbd> <kbd>k</kbd> line{rights.mark ? <>, <kbd>v</kbd> seen</> : null}
            {rights.raise ? <>, <kbd>m</kbd> write in the margin</> : null}
            {rights.correct ? <>, <kbd>c</kbd> correct</> : null}, <kbd>h</kbd> history{hasNext ? <>, <kbd>]</kbd> next form</> : null}
          </>
        ) : (
          'Single keys are off.'
        )}
        <Button kind="link" className="!font-normal" onClick={onKeys}>
          {keysOn ? 'Turn keys off' : 'Turn keys on'}
        </Button>
      </span>
    </div>
  );
}
