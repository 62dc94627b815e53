'use client';
import { sessionInPounds } from '@/instruments/checks/session-patterns';
import type { LogView } from '@/lib/training/view-log';
import { Button } from '../../ui/button';
import { formatDate } from '../../ui/format';
import { TextArea } from '../../ui/text-area';
import type { Draft, DraftSet } from './draft';
import { allowedFor, armState } from './log-rules';

export interface CheckStepProps {
  view: LogView;
  draft: Draft;
  onEdit: (index: number) => void;
  onNote: (note: string) => void;
  onPounds: () => void;
}

const words = ({ equipment, typed, unit, repetitions, setCount }: DraftSet): string =>
  `${equipment === 'body weight' ? 'body weight' : equipment === 'band' ? `band level ${typed}` : `${typed} ${unit}`}, ${repetitions} lifts, ${setCount} ${setCount === 1 ? 'set' : 'sets'}`;

/** Kilograms that were pounds last time, over two exercises or more. */
function poundsFinding(view: LogView, draft: Draft): string | null {
  const loads = draft.sets
    .filter(({ state, unit, equipment }) => state === 'done' && unit === 'kg' && equipment !== 'band' && equipment !== 'body weight')
    .flatMap((set) => {
      const beforeKg = allowedFor(view, set, draft.on, armState(view, draft.on, draft.armCheck)).lastKg;
      return beforeKg === null ? [] : [{ beforeKg, nowKg: set.typed }];
    });
  return sessionInPounds.run({ loads })?.message ?? null;
}

/** All of it once more before it is saved. */
export function CheckStep({ view, draft, onEdit, onNote, onPounds }: CheckStepProps) {
  const pounds = poundsFinding(view, draft);
  return (
    <>
      <h1>Your session</h1>
      <p className="phone-lede">
        {formatDate(draft.on)}. Your arm: {draft.armCheck}. Sore: {draft.soreness}.
      </p>
      {pounds ? (
        <div className="phone-say" role="status">
          <p>
            {pounds}{' '}
            <Button kind="link" className="pad-44" onClick={onPounds}>
              Change all to pounds
            </Button>
          </p>
        </div>
      ) : null}
      <ul className="phone-list mt-4 border-t border-rule">
        {draft.sets.map((set, index) => (
          <li key={set.exercise} className="flex items-center justify-between gap-4">
            <span>
              <b>{set.name}</b>
              <span className="block text-[16px] text-ink-2">{set.state === 'done' ? words(set) : 'not done'}</span>
            </span>
            <Button kind="link" className="pad-44" onClick={() => onEdit(index)} aria-label={`Change ${set.name}`}>
              Change
            </Button>
          </li>
        ))}
      </ul>
      <div className="mt-6">
        <TextArea label="Anything your site should know" optional maxLength={500} value={draft.note} onChange={(event) => onNote(event.target.value)} />
      </div>
    </>
  );
}
