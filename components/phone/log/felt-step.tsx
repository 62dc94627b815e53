'use client';
import { Gauge } from '../../ui/gauge';
import { RadioGroup } from '../../ui/radio-group';
import type { Draft, DraftSet } from './draft';

/** Lifts left in reserve, as points of ten: about 10 less what is left. Common practice, no source. */
const effortWords = [
  { value: '3', label: 'Easy, many more in me' },
  { value: '5', label: 'Five or more left' },
  { value: '7', label: 'Two to four left' },
  { value: '9', label: 'One left' },
  { value: '10', label: 'Nothing left' },
] as const;

export interface FeltStepProps {
  set: DraftSet;
  index: number;
  count: number;
  soreness: Draft['soreness'];
  /** Asked once a session, with its first exercise. */
  asksSoreness: boolean;
  onEffort: (effort: number) => void;
  onSoreness: (soreness: NonNullable<Draft['soreness']>) => void;
  errors: { effort?: string; soreness?: string };
}

/** How it felt, in plain words. Nothing is chosen beforehand. */
export function FeltStep({ set, index, count, soreness, asksSoreness, onEffort, onSoreness, errors }: FeltStepProps) {
  const load = set.equipment === 'body weight' ? '' : set.equipment === 'band' ? `, band level ${set.typed}` : `, ${set.typed} ${set.unit}`;
  return (
    <>
      <div className="phone-step-head">
        <span>
          {set.name}
          {load}
        </span>
        <Gauge bare size={84} state="part" level={(index + 0.6) / count} word={`Exercise ${index + 1} of ${count}`} />
      </div>
      <h1>How hard was the last set?</h1>
      <div className="mt-4">
        <RadioGroup
          id="effort"
          name="effort"
          as="tiles"
          labelHidden
          label="How hard was the last set?"
          choices={effortWords}
          value={set.effort === null ? null : String(set.effort)}
          onChange={(event) => onEffort(Number(event.target.value))}
          error={errors.effort}
        />
      </div>
      {asksSoreness ? (
        <div className="mt-7">
          <h2>Sore since last time?</h2>
          <div className="mt-2.5">
            <RadioGroup
              id="soreness"
              name="soreness"
              as="row"
              labelHidden
              label="Sore since last time?"
              choices={[
                { value: 'no', label: 'No' },
                { value: 'a little', label: 'A little' },
                { value: 'a lot', label: 'A lot' },
              ]}
              value={soreness}
              onChange={(event) => onSoreness(event.target.value as NonNullable<Draft['soreness']>)}
              error={errors.soreness}
            />
          </div>
          <p className="mt-3 text-[16px] leading-[23px] text-ink-2">Sore muscles are common for a day or two. A fuller or heavier arm is not soreness: say so in the arm check.</p>
        </div>
      ) : null}
    </>
  );
}
