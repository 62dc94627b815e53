'use client';

import { impedanceRatioRange, weight } from '@/instruments/checks/measured-ranges';
import { parseImpedanceRatio, parseWeightKg, readDecimal } from '@/instruments/measurement/parse';
import { otherPositions } from '@/lib/measurement/input';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { NumberField } from '../ui/number-field';
import { RadioGroup } from '../ui/radio-group';
import { Select } from '../ui/select';
import { TextArea } from '../ui/text-area';
import { ChangeTo } from './change-to';
import type { Doubt } from './typed-sitting';

/** What stands round the tape, as typed. */
export interface TypedCircumstances {
  readonly position: string;
  readonly sleeveWorn: '' | 'yes' | 'no';
  readonly hoursSinceTraining: string;
  readonly bodyWeight: string;
  readonly impedanceRatio: string;
  readonly impedanceRest: string;
  readonly remarks: string;
}

export type Circumstances = OpenAssessmentView['circumstances'];

const text = (value: number | null, decimals = 0): string => (value === null ? '' : value.toFixed(decimals));

export const typedCircumstances = (kept: Circumstances): TypedCircumstances => ({
  position: kept.position ?? '',
  sleeveWorn: kept.sleeveWorn === null ? '' : kept.sleeveWorn ? 'yes' : 'no',
  hoursSinceTraining: text(kept.hoursSinceTraining),
  bodyWeight: kept.bodyWeightG === null ? '' : (kept.bodyWeightG / 1000).toFixed(1),
  impedanceRatio: kept.impedanceRatio === null ? '' : String(kept.impedanceRatio),
  impedanceRest: text(kept.impedanceRestMin),
  remarks: kept.remarks ?? '',
});

type FieldName = keyof TypedCircumstances;

/** The fields read, with a sentence for each that cannot be; such a field is not sent and stays as typed. */
export function readCircumstances(typed: TypedCircumstances): { values: Circumstances; problems: Partial<Record<FieldName, string>> } {
  const problems: Partial<Record<FieldName, string>> = {};
  const whole = (name: FieldName, most: number, what: string): number | null => {
    if (!typed[name].trim()) return null;
    const value = readDecimal(typed[name]);
    if (value !== null && Number.isInteger(value) && value >= 0 && value <= most) return value;
    problems[name] = `${typed[name].trim()} is not ${what}.`;
    return null;
  };
  const kg = typed.bodyWeight.trim() ? parseWeightKg(typed.bodyWeight) : null;
  if (kg && !kg.ok) problems.bodyWeight = kg.reason;
  const ratio = typed.impedanceRatio.trim() ? parseImpedanceRatio(typed.impedanceRatio) : null;
  if (ratio && !ratio.ok) problems.impedanceRatio = ratio.reason;
  const values: Circumstances = {
    position: typed.position || null,
    sleeveWorn: typed.sleeveWorn === '' ? null : typed.sleeveWorn === 'yes',
    hoursSinceTraining: whole('hoursSinceTraining', 999, 'a number of hours from 0 to 999'),
    bodyWeightG: kg?.ok ? Math.round(kg.value * 1000) : null,
    impedanceRatio: ratio?.ok ? ratio.value : null,
    impedanceRestMin: whole('impedanceRest', 120, 'a number of minutes from 0 to 120'),
    remarks: typed.remarks.trim() || null,
  };
  return { values, problems };
}

/** Doubts about weight and ratio, as the server will have them; a weight that would be usual in pounds is answered with that one guess. */
export function doubtsBeside({ bodyWeightG, impedanceRatio }: Circumstances): Doubt[] {
  const kg = bodyWeightG === null ? null : bodyWeightG / 1000;
  const found = [
    { place: 'weight', finding: kg === null ? null : (weight.limit.run(kg) ?? weight.range.run(kg)) },
    { place: 'ratio', finding: impedanceRatio === null ? null : (impedanceRatioRange.limit.run(impedanceRatio) ?? impedanceRatioRange.range.run(impedanceRatio)) },
  ];
  const inPounds = kg === null ? null : parseWeightKg(String(kg));
  return found.flatMap(({ place, finding }) => {
    if (!finding) return [];
    const doubt = { place, check: finding.check, severity: finding.severity, message: finding.message };
    if (place !== 'weight' || !inPounds?.ok || !inPounds.suspicion || inPounds.likely === undefined) return [doubt];
    return [{ ...doubt, message: `${inPounds.suspicion} Change it, or keep it and say why.`, likely: { typed: inPounds.likely.toFixed(1), unit: 'kg' } }];
  });
}

export interface BesideTapeProps {
  typed: TypedCircumstances;
  protocolPosition: string;
  problems: Partial<Record<FieldName, string>>;
  /** What is doubtful about the weight, while nobody has said why it is kept. */
  weightDoubt: Doubt | null;
  onType: (change: Partial<TypedCircumstances>) => void;
  onLeave: () => void;
}

/** Position, sleeve, weight and ratio: asked before the tape is laid. */
export function BesideTape({ typed, protocolPosition, problems, weightDoubt, onType, onLeave }: BesideTapeProps) {
  const positions = [...new Set([protocolPosition, ...otherPositions, ...(typed.position ? [typed.position] : [])])].map((value) => ({
    value,
    label: value === protocolPosition ? `${value} (protocol)` : value,
  }));
  const field = (name: FieldName) => ({
    id: name,
    value: typed[name],
    error: problems[name],
    onChange: (event: { target: { value: string } }) => onType({ [name]: event.target.value }),
    onBlur: onLeave,
  });
  const changeWeight = (bodyWeight: string) => {
    onType({ bodyWeight });
    document.getElementById('bodyWeight')?.focus();
  };
  return (
    <section className="beside-tape" aria-labelledby="beside-tape">
      <h3 id="beside-tape">Before measuring</h3>
      <Select label="Position of the arms" none="Choose how they are held" choices={positions} {...field('position')} />
      <RadioGroup
        id="sleeveWorn"
        name="sleeveWorn"
        label="Sleeve in the last 12 hours"
        as="row"
        choices={[
          { value: 'no', label: 'Not worn' },
          { value: 'yes', label: 'Worn' },
        ]}
        value={typed.sleeveWorn || null}
        error={problems.sleeveWorn}
        onChange={(event) => onType({ sleeveWorn: event.target.value === 'yes' ? 'yes' : 'no' })}
        onBlur={onLeave}
      />
      <div className="beside-pair">
        <NumberField label="Since last training" unit="h" {...field('hoursSinceTraining')} />
        <div className="beside-weight">
          <NumberField label="Body weight" unit="kg" hint={weightDoubt?.message} {...field('bodyWeight')} />
          {weightDoubt?.likely ? <ChangeTo likely={weightDoubt.likely} onChange={changeWeight} /> : null}
        </div>
        <NumberField label="Impedance ratio" unit="" hint="unaffected over at risk" {...field('impedanceRatio')} />
        <NumberField label="Lying down for" unit="min" hint="before the ratio" {...field('impedanceRest')} />
      </div>
      <TextArea label="Remarks" optional rows={2} maxLength={500} {...field('remarks')} />
    </section>
  );
}
