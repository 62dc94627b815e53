'use client';
import { kgToLb, massToKg } from '@/instruments/units';
import type { LogView } from '@/lib/training/view-log';
import { TRAINING_CAUTION } from '@/instruments/training/advice';
import { LoadScale } from '../../chart/load-scale';
import { Button } from '../../ui/button';
import { formatDate, formatNumber } from '../../ui/format';
import { Gauge } from '../../ui/gauge';
import { RadioGroup } from '../../ui/radio-group';
import { Select } from '../../ui/select';
import { Stepper } from '../../ui/stepper';
import type { DraftSet } from './draft';
import { allowedFor, looksLikePounds, type armState } from './log-rules';

export interface LoadStepProps {
  view: LogView;
  set: DraftSet;
  index: number;
  count: number;
  on: string;
  arm: ReturnType<typeof armState>;
  onChange: (change: Partial<DraftSet>) => void;
  onLeaveOut: () => void;
  /** Whether what was typed last could not be kept. */
  onFault: (isFaulty: boolean) => void;
}

const sideWords = { both: 'both arms', left: 'left arm', right: 'right arm' } as const;
const plain = (value: number): string => String(Number(value.toFixed(2)));

/** One exercise: what was lifted, how often. The proposal is last time's; it counts only once it is confirmed. */
export function LoadStep({ view, set, index, count, on, arm, onChange, onLeaveOut, onFault }: LoadStepProps) {
  const last = view.last[set.exercise];
  return (
    <>
      <div className="phone-step-head">
        <span>
          Exercise {index + 1} of {count}
        </span>
        <Gauge bare size={84} state="part" level={(index + 0.15) / count} word={`Exercise ${index + 1} of ${count}`} />
      </div>
      <h1>{set.name}</h1>
      <p className="phone-lede">
        {last
          ? `Last time, ${formatDate(last.on)}: ${last.equipment === 'body weight' ? 'body weight' : last.equipment === 'band' ? `band level ${plain(last.typed)}` : `${plain(last.typed)} ${last.unit}`}, ${last.repetitions} lifts, ${last.setCount} sets.`
          : 'Your first time.'}
      </p>
      {set.equipment === 'body weight' ? null : <Load {...{ view, set, on, arm, onChange, onFault }} />}
      <div className="mt-6 grid gap-3">
        <Stepper size="small" label="Lifts in a row" value={set.repetitions} min={1} max={100} onFault={onFault} onChange={(repetitions) => onChange({ repetitions })} />
        <Stepper size="small" label="Sets" value={set.setCount} min={1} max={20} onFault={onFault} onChange={(setCount) => onChange({ setCount })} />
      </div>
      <HowLifted {...{ view, set, onChange }} />
      <p className="mt-6 text-[16px] leading-[23px] text-ink-2">
        {TRAINING_CAUTION} If your arm changes between sessions, stop and contact the site.{' '}
        <Button kind="link" className="pad-44" onClick={onLeaveOut}>
          I did not do this one
        </Button>
      </p>
    </>
  );
}

function Load({ view, set, on, arm, onChange, onFault }: Pick<LoadStepProps, 'view' | 'set' | 'on' | 'arm' | 'onChange' | 'onFault'>) {
  const isBand = set.equipment === 'band';
  const allowed = allowedFor(view, set, on, arm);
  const loadKg = massToKg(set.typed, set.unit);
  const isOver = !isBand && (loadKg > allowed.upToKg + 1e-6 || allowed.hold);
  const step = isBand || set.unit === 'lb' ? 1 : 0.5;
  return (
    <>
      <div className="mt-6">
        <Stepper
          label={isBand ? 'Band level' : set.basis === 'per hand' ? 'Weight in each hand' : set.basis === 'machine setting' ? 'Weight set on the machine' : 'Weight in all'}
          labelHidden={!isBand}
          value={set.typed}
          step={step}
          decimals={Number.isInteger(set.typed * 10) ? (step === 1 && Number.isInteger(set.typed) ? 0 : 1) : 2}
          max={isBand ? 10 : set.unit === 'lb' ? 330 : 150}
          min={isBand ? 1 : 0}
          {...(isBand ? {} : { unit: set.unit })}
          outside={isOver}
          onFault={onFault}
          onChange={(typed) => onChange({ typed: Number(typed.toFixed(2)), isTouched: true, alreadyLifted: false })}
        />
      </div>
      {isBand ? null : (
        <>
          <p className="mt-2 text-center text-[16px] text-ink-2">{basisWords(set)}</p>
          <div className="mt-2">
            <LoadScale yoursKg={loadKg} lastWeekKg={allowed.lastWeekKg} upToKg={allowed.upToKg} outsideKg={(allowed.lastKg ?? 0) + view.settings.jumpKg} />
          </div>
          <p className="mt-0.5 text-[16px] leading-[23px] text-ink-2">{allowed.why}</p>
          {looksLikePounds(set, allowed.lastKg) ? (
            <p className="phone-say" role="status">
              {plain(set.typed)} lb is {formatNumber(massToKg(set.typed, 'lb'), 1)} kg, about what you lifted last time. Did you read pounds?{' '}
              <Button kind="link" className="pad-44" onClick={() => onChange({ unit: 'lb', isTouched: true })}>
                Change to pounds
              </Button>
            </p>
          ) : null}
        </>
      )}
    </>
  );
}

function basisWords({ basis, unit, typed }: DraftSet): string {
  const basisText = basis === 'per hand' ? 'in each hand' : basis === 'machine setting' ? 'as set on the machine' : 'in all';
  return unit === 'lb' ? `${basisText}, ${formatNumber(massToKg(typed, 'lb'), 2)} kg` : basisText;
}

/** Unit, equipment and side: rarely changed, so behind a fold. */
function HowLifted({ view, set, onChange }: Pick<LoadStepProps, 'view' | 'set' | 'onChange'>) {
  const kinds = view.exercises.find(({ code }) => code === set.exercise)?.equipment ?? [set.equipment];
  const again = { isTouched: false, alreadyLifted: false } as const;
  return (
    <details className="mt-5 border-t border-rule pt-2">
      <summary className="flex min-h-11 items-center justify-between gap-3 text-[16px] text-ink-2">
        <span>
          {set.equipment === 'body weight' ? 'Body weight' : `With ${set.equipment}, ${sideWords[set.side]}, in ${set.unit === 'lb' ? 'pounds' : 'kilograms'}`}
        </span>
        <span className="font-semibold text-act underline underline-offset-4">Change</span>
      </summary>
      <div className="mt-3 grid gap-4">
        <RadioGroup name="unit" as="row" label="Unit on the weight" choices={[{ value: 'kg', label: 'kg' }, { value: 'lb', label: 'lb' }]} value={set.unit} onChange={(event) => onChange(switchUnit(set, event.target.value as 'kg' | 'lb'))} />
        <Select label="With" choices={kinds.map((kind) => ({ value: kind, label: kind }))} value={set.equipment} onChange={(event) => onChange({ equipment: event.target.value as DraftSet['equipment'], ...again })} />
        <Select label="Arm" choices={(['both', 'left', 'right'] as const).map((side) => ({ value: side, label: sideWords[side] }))} value={set.side} onChange={(event) => onChange({ side: event.target.value as DraftSet['side'], ...again })} />
      </div>
    </details>
  );
}

/** A figure set by hand is what the weight says, so it stays; a mere proposal is converted. */
function switchUnit({ typed, isTouched, unit: from }: DraftSet, unit: 'kg' | 'lb'): Partial<DraftSet> {
  if (isTouched || from === unit) return { unit };
  return { unit, typed: unit === 'lb' ? Math.floor(kgToLb(typed) + 1e-9) : Math.floor(massToKg(typed, 'lb') * 2) / 2 };
}
