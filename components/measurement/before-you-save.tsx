'use client';

import { useState } from 'react';
import { Button } from '../ui/button';
import { TextField } from '../ui/text-field';
import { ChangeTo } from './change-to';
import { cellOf } from './grid-keys';
import { placeWords, type Doubt } from './typed-sitting';

/** A doubt as the list shows it: its kept reason, where it has one. */
export interface ListedDoubt extends Doubt {
  /** The figure in question, as typed. */
  readonly figure: string;
  readonly reason: string | null;
}

export interface BeforeYouSaveProps {
  doubts: readonly ListedDoubt[];
  map: { readonly startOffsetMm: number; readonly stepMm: number };
  onMeasureAgain: (doubt: Doubt) => void;
  onKeep: (doubt: Doubt, reason: string | null) => void;
  /** Puts in what was probably meant. */
  onChange: (doubt: Doubt, typed: string) => void;
}

/** Id of a doubt in the list, so that saving too early leads to it. */
export const doubtId = ({ check, place }: Pick<Doubt, 'check' | 'place'>): string => `doubt-${check}-${place}`.replaceAll(/[ .]/g, '-');

/** What is doubtful, in words, each with its ways out: measure it again, or, where it can be so, keep it and say why. */
export function BeforeYouSave({ doubts, map, ...on }: BeforeYouSaveProps) {
  if (doubts.length === 0) return null;
  const pressing = doubts.filter((doubt) => isPressing(doubt));
  const hints = doubts.filter((doubt) => !isPressing(doubt));
  const rest = hints.length - hintsShown;
  return (
    <section className="before-save" aria-labelledby="before-save">
      <h3 id="before-save">Before you save</h3>
      <ul>
        {[...pressing, ...hints.slice(0, hintsShown)].map((doubt) => (
          <DoubtLine key={`${doubt.check} ${doubt.place}`} {...{ doubt, map, ...on }} />
        ))}
      </ul>
      {rest > 0 ? <p className="t-small text-ink-2">And {rest} more that are unusual. If the tape reads so, there is nothing to do.</p> : null}
    </section>
  );
}

/** Unusual values are listed up to here: an arm that is unusual throughout should not hide what is doubtful. */
const hintsShown = 6;

/** Waits for something: a reason, a third reading, or a figure that can be read. */
export const isPressing = ({ check, severity }: Pick<Doubt, 'check' | 'severity'>): boolean =>
  severity !== 'hint' || check === 'trials.differ' || check === 'entry.read';

const elsewhere: Record<string, string> = { weight: 'Body weight', ratio: 'Impedance ratio', whole: 'Both arms', left: 'Left arm', right: 'Right arm' };

function DoubtLine({ doubt, map, onMeasureAgain, onKeep, onChange }: Omit<BeforeYouSaveProps, 'doubts'> & { doubt: ListedDoubt }) {
  const [writing, setWriting] = useState(false);
  const cell = cellOf(doubt.place);
  const isHot = doubt.severity !== 'hint' && doubt.reason === null;
  const where = cell ? placeWords(cell, map) : (elsewhere[doubt.place] ?? doubt.place);
  // A third reading answers trials that differ; nothing need be written about it, nor about a mere hint.
  // What cannot be right is not kept, whatever the reason.
  const mayKeep = doubt.severity === 'soft';
  return (
    <li id={doubtId(doubt)} tabIndex={-1} className={isHot ? 'before-hot' : undefined}>
      <b className={isHot ? 'is-needs' : undefined}>{where}</b>
      <div>
        <p>{doubt.message}</p>
        {doubt.reason ? <p className="note-by">Kept: “{doubt.reason}”</p> : null}
        {writing ? (
          <KeepForm
            figure={doubt.figure}
            onKeep={(reason) => {
              onKeep(doubt, reason);
              setWriting(false);
            }}
          />
        ) : (
          <p className="before-ways">
            {doubt.likely && !doubt.reason ? <ChangeTo likely={doubt.likely} onChange={(typed) => onChange(doubt, typed)} /> : null}
            {doubt.reason ? (
              <Button kind="link" onClick={() => onKeep(doubt, null)}>
                Take the reason back
              </Button>
            ) : (
              <Button kind="link" onClick={() => onMeasureAgain(doubt)}>
                Measure again
              </Button>
            )}
            {mayKeep && !doubt.reason ? (
              <Button kind="link" onClick={() => setWriting(true)}>
                {doubt.figure ? `Keep ${doubt.figure}, give a reason` : 'Keep it, give a reason'}
              </Button>
            ) : null}
          </p>
        )}
      </div>
    </li>
  );
}

function KeepForm({ figure, onKeep }: { figure: string; onKeep: (reason: string) => void }) {
  const [reason, setReason] = useState('');
  const [tooShort, setTooShort] = useState(false);
  return (
    <form
      className="before-keep"
      onSubmit={(event) => {
        event.preventDefault();
        if (reason.trim().length < 3) setTooShort(true);
        else onKeep(reason.trim());
      }}
    >
      <TextField
        label={figure ? `Why ${figure} is kept` : 'Why it is kept'}
        hint="It stands in the margin beside the value"
        autoFocus
        maxLength={300}
        value={reason}
        error={tooShort && reason.trim().length < 3 ? 'Say why it is kept.' : undefined}
        onChange={(event) => setReason(event.target.value)}
      />
      <Button type="submit" size="small">
        Keep it
      </Button>
    </form>
  );
}
