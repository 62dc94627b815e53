'use client';

import { upperFirst } from '@/instruments/words';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { Button } from '../ui/button';
import { Buoy } from '../ui/signs';
import type { KeptState } from './use-kept-sitting';

/** Where what is typed is kept, in words with the time; another person's saving is asked about first. */
export function SaveWords({ state, onMine, onTheirs }: { state: KeptState; onMine: (theirs: OpenAssessmentView) => void; onTheirs: (theirs: OpenAssessmentView) => void }) {
  if (state.kind === 'conflict')
    return (
      <div role="alert" className="save-conflict">
        <p>
          <b>Somebody else saved this form in the meantime.</b> What you typed is still here.
        </p>
        <Button size="small" onClick={() => onMine(state.theirs)}>
          Save what is here over it
        </Button>
        <Button kind="link" onClick={() => onTheirs(state.theirs)}>
          Go on from theirs
        </Button>
      </div>
    );
  if (state.kind === 'failed')
    return (
      <p role="alert" className="save-words is-needs">
        {state.sentence} It is tried again every 30 seconds while this page is open.
      </p>
    );
  return (
    <p role="status" className="save-words">
      {state.kind === 'saving' ? 'Keeping what is typed' : state.at ? `Kept on the server, ${timeOf(state.at)}` : 'Kept on the server as you go'}
    </p>
  );
}

const timeOf = (at: Date): string => at.toLocaleTimeString('en-GB', { hour: '2-digit', minute: '2-digit', second: '2-digit' });

/** Where there is room for one arm only. */
export function ArmChoice({ arm, onArm }: { arm: 'left' | 'right'; onArm: (arm: 'left' | 'right') => void }) {
  return (
    <div className="arm-choice" role="group" aria-label="The arm in sight">
      {(['left', 'right'] as const).map((side) => (
        <button key={side} type="button" aria-pressed={arm === side} onClick={() => onArm(side)}>
          {side === 'left' ? 'Left arm' : 'Right arm'}
        </button>
      ))}
    </div>
  );
}

/** The keys, and the cover over trial 1. */
export function GridWords({ covered, onCover }: { covered: boolean; onCover: () => void }) {
  return (
    <p className="grid-words">
      Girth in cm. <kbd>Enter</kbd> goes down the column, then to the top of the next. <kbd>Esc</kbd> clears.{' '}
      <Button kind="link" aria-pressed={covered} onClick={onCover}>
        {covered ? 'Uncover trial 1' : 'Cover trial 1'}
      </Button>
    </p>
  );
}

/** Over the drawing: which arm is which. */
export function DrawingHead({ affectedSide }: { affectedSide: 'left' | 'right' }) {
  return (
    <div className="drawing-head">
      <b>{affectedSide === 'left' ? 'Left, affected' : 'Left'}</b>
      <b>{affectedSide === 'right' ? 'Right, affected' : 'Right'}</b>
    </div>
  );
}

const words = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve'];
const counted = (count: number, one: string, many: string): string => `${words[count] ?? count} ${count === 1 ? one : many}`;

function toGo(girths: number, answers: number): string {
  const parts = [...(girths ? [counted(girths, 'girth', 'girths')] : []), ...(answers ? [counted(answers, 'answer', 'answers')] : [])];
  if (parts.length === 0) return 'Both trials are in. Earlier values and the change appear once they are saved.';
  const text = parts.join(' and ');
  return `${upperFirst(text)} to go; saving takes you to the first. Earlier values and the change stay hidden until both trials are saved.`;
}

/** Save, leave, what is still to do, and the caution. */
export function EntryFoot({ girths, answers, atWork, onSave, onLeave }: { girths: number; answers: number; atWork: string | false; onSave: () => void; onLeave: () => void }) {
  return (
    <div className="entry-foot">
      <Button kind="primary" atWork={atWork} onClick={onSave}>
        Save and see the result
      </Button>
      <Button onClick={onLeave}>Leave unfinished</Button>
      <span className="entry-to-go">{toGo(girths, answers)}</span>
      <span className="entry-caution">
        <Buoy size={20} title="Caution" /> Arm hot, red, suddenly swollen, or fever: stop, and send for urgent care.
      </span>
    </div>
  );
}
